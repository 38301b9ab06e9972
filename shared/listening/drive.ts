import type { Drive } from './sound.ts';

/** How often the table goes round each second: fs/N, or W·fs/2^M. Of a `once`, as if it went on. */
export function roundHzOf(drive: Drive, tableLength: number): number {
  if (drive.kind === 'accumulator') return (drive.stepWord * drive.sampleRateHz) / 2 ** drive.accumulatorBits;
  return drive.sampleRateHz / tableLength;
}

/** Frequency of the tone of a table that holds K cycles, in Hz. */
export const toneHzOf = (drive: Drive, tableLength: number, cycles: number): number =>
  cycles * roundHzOf(drive, tableLength);

/**
 * The drive that gives a tone: of a loop or a pass by its sample rate, exactly; of an accumulator by the nearest step
 * word, 1 … 2^M − 1, its sample rate kept.
 */
export function driveAtTone(drive: Drive, tableLength: number, cycles: number, toneHz: number): Drive {
  if (drive.kind !== 'accumulator') return { ...drive, sampleRateHz: (toneHz * tableLength) / cycles };
  const steps = 2 ** drive.accumulatorBits;
  const nearest = Math.round((toneHz / cycles / drive.sampleRateHz) * steps);
  return { ...drive, stepWord: Math.min(steps - 1, Math.max(1, nearest)) };
}
