import type { TableSettings } from '../../../../../shared/contract/index.ts';
import type { ToneDrive } from '../../../../../shared/listening/index.ts';
import type { Drive } from '../../../../../shared/listening/sound.ts';
import { sampleRateOf, timerOf, type Playback } from '../../state/wave.ts';
import { whyNoAccumulator } from '../drive.ts';
import type { KeyWishes } from './key-wishes.ts';

export interface ToneDrives {
  /** By which the bench plays the table. */
  readonly ofBench: ToneDrive['kind'];
  readonly rate: ToneDrive;
  /** There where the sample rate was chosen by a timer's settings. */
  readonly timer: ToneDrive | null;
  /** There where an accumulator is chosen and the table's length lets it be. */
  readonly accumulator: ToneDrive | null;
}

/**
 * The ways in which the part could make notes.
 *
 * @param compareBits width of the timer's compare register
 */
export function toneDrivesOf(
  { length: tableLength, cycles }: TableSettings,
  playback: Playback,
  compareBits: number,
): ToneDrives {
  const timer = timerOf(playback);
  const { accumulator } = playback;
  const byTimer: ToneDrive | null =
    timer === undefined
      ? null
      : {
          kind: 'timer',
          clockHz: timer.clockHz,
          prescaler: timer.prescaler,
          // A register that holds the value that is chosen.
          compareBits: Math.max(compareBits, Math.ceil(Math.log2(timer.compare + 1))),
          tableLength,
          cycles,
        };
  const byWord: ToneDrive | null =
    accumulator === undefined || whyNoAccumulator(playback, tableLength) !== null
      ? null
      : {
          kind: 'accumulator',
          sampleRateHz: sampleRateOf(playback, { length: tableLength, cycles }),
          accumulatorBits: accumulator.accumulatorBits,
          cycles,
        };
  const isByWord = playback.mode === 'accumulator' && byWord !== null;
  return {
    ofBench: isByWord ? 'accumulator' : byTimer === null ? 'rate' : 'timer',
    rate: { kind: 'rate', tableLength, cycles },
    timer: byTimer,
    accumulator: byWord,
  };
}

/** The wished one, where there is such; else as the bench plays. */
export function chosenDrive(drives: ToneDrives, by: KeyWishes['by']): ToneDrive {
  return (by === 'bench' ? null : drives[by]) ?? drives[drives.ofBench] ?? drives.rate;
}

/** What the player is given to play notes with. */
export function playedDrive(drive: ToneDrive, playback: Playback, { length, cycles }: TableSettings): Drive {
  const sampleRateHz = sampleRateOf(playback, { length, cycles });
  return drive.kind === 'accumulator' && playback.accumulator !== undefined
    ? { kind: 'accumulator', sampleRateHz, ...playback.accumulator }
    : { kind: 'loop', sampleRateHz };
}

/** Name of what a drive's register holds. */
export const wordNames: Readonly<Record<ToneDrive['kind'], string>> = {
  rate: 'Sample rate',
  timer: 'Compare value',
  accumulator: 'Step word',
};
