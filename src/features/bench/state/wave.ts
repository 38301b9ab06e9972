import { z } from 'zod';
import { pulsePatternSchema, type Definition } from '../../../../shared/contract/index.ts';
import { sampleRateOfTone, toneOfSampleRate } from '../../../audio/playback-rate.ts';

const frequencyError = 'a finite number of hertz';

/** A timer whose overflow makes the sample rate: `clock/(prescaler·(compare + 1))`. */
const timerSchema = z.strictObject({ clockHz: z.number(), prescaler: z.int(), compare: z.int() });

/** A phase accumulator over the table: bits M and step word W of engine specification §5. */
const accumulatorSchema = z.strictObject({ accumulatorBits: z.int(), stepWord: z.number() });

/** How a wave is listened to. It travels with the wave but is no part of the table. */
export const playbackSchema = z.strictObject({
  /** `accumulator` counts where one is chosen and the table's length is a power of two; else it is a loop. */
  mode: z.enum(['loop', 'once', 'accumulator']),
  by: z.enum(['tone', 'sampleRate']),
  toneHz: z.number({ error: frequencyError }),
  sampleRateHz: z.number({ error: frequencyError }),
  /** The timer settings that the sample rate was chosen by, if it was. */
  timer: timerSchema.optional(),
  accumulator: accumulatorSchema.optional(),
  /** Pulses and pauses that the tone sounds in. */
  pattern: pulsePatternSchema.optional(),
});

export type TimerSettings = z.infer<typeof timerSchema>;
export type Playback = z.infer<typeof playbackSchema>;

/** What a read-only link carries: everything that is needed to see and hear the wave. */
export interface Wave {
  readonly definition: Definition;
  readonly playback: Playback;
}

/** Which files the export flight shows, and each target's options as they were typed. */
export const exportChoiceSchema = z.strictObject({
  target: z.string(),
  options: z.record(z.string(), z.record(z.string(), z.unknown())),
});

export type ExportChoice = z.infer<typeof exportChoiceSchema>;

/**
 * All that the bench holds and undo brings back. The definition is a draft: it has a definition's shape, but its
 * numbers are as typed and may be refused.
 */
export interface Work extends Wave {
  readonly exporting: ExportChoice;
}

type Lengths = Pick<Definition['table'], 'length' | 'cycles'>;

/** Sample rate in hertz that the table is played at, whichever way that is set. */
export function sampleRateOf({ by, sampleRateHz, toneHz }: Playback, { length, cycles }: Lengths): number {
  return by === 'sampleRate'
    ? sampleRateHz
    : sampleRateOfTone(toneHz, { tableLength: length, tableCycles: cycles });
}

/** Tone in hertz of the loop, whichever way that is set. */
export function toneOf({ by, sampleRateHz, toneHz }: Playback, { length, cycles }: Lengths): number {
  return by === 'tone'
    ? toneHz
    : toneOfSampleRate(sampleRateHz, { tableLength: length, tableCycles: cycles });
}

/** The timer that makes the sample rate; none where the rate has been set otherwise since one was chosen. */
export function timerOf({ by, sampleRateHz, timer }: Playback): TimerSettings | undefined {
  if (timer === undefined || by !== 'sampleRate') return undefined;
  return timer.clockHz / (timer.prescaler * (timer.compare + 1)) === sampleRateHz ? timer : undefined;
}
