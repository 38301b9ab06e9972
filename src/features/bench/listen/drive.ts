import type { Drive } from '../../../../shared/listening/sound.ts';
import { sampleRateOf, type Playback } from '../state/wave.ts';

interface Lengths {
  readonly length: number;
  readonly cycles: number;
}

/** Why a playback that asks for an accumulator cannot have it; null where it can, and where it does not ask. */
export function whyNoAccumulator({ accumulator }: Playback, length: number): string | null {
  if (accumulator === undefined) return 'no accumulator is chosen';
  const indexBits = Math.log2(length);
  if (!Number.isInteger(indexBits)) return `the table length must be a power of two, and ${length} is none`;
  const { accumulatorBits: bits, stepWord } = accumulator;
  if (!(bits >= indexBits && bits <= 48)) return `the accumulator must have ${indexBits} to 48 bits`;
  if (!(Number.isInteger(stepWord) && stepWord >= 1 && stepWord < 2 ** bits))
    return `the step word must be a whole number from 1 to ${2 ** bits - 1}`;
  return null;
}

/** How a table is driven by a playback. An accumulator that cannot be is a loop. */
export function driveOf(playback: Playback, table: Lengths): Drive {
  const sampleRateHz = sampleRateOf(playback, table);
  const { mode, accumulator } = playback;
  if (mode !== 'accumulator') return { kind: mode, sampleRateHz };
  if (accumulator === undefined || whyNoAccumulator(playback, table.length) !== null)
    return { kind: 'loop', sampleRateHz };
  return { kind: 'accumulator', sampleRateHz, ...accumulator };
}

/** Tone in hertz that a drive gives of a table: `K·fs/N`, or `K·W·fs/2^M` folded below half of the sample rate. */
export function toneOfDrive(drive: Drive, { length, cycles }: Lengths): number {
  if (drive.kind !== 'accumulator') return (cycles * drive.sampleRateHz) / length;
  const turn = ((cycles * drive.stepWord) / 2 ** drive.accumulatorBits) % 1;
  return Math.min(turn, 1 - turn) * drive.sampleRateHz;
}
