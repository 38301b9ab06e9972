import { z } from 'zod';
import type { Definition } from '../../../../shared/contract/index.ts';
import { sampleRateOfTone, toneOfSampleRate } from '../../../audio/playback-rate.ts';

const frequencyError = 'a finite number of hertz';

/** How a wave is listened to. It travels with the wave but is no part of the table. */
export const playbackSchema = z.strictObject({
  mode: z.enum(['loop', 'once']),
  by: z.enum(['tone', 'sampleRate']),
  toneHz: z.number({ error: frequencyError }),
  sampleRateHz: z.number({ error: frequencyError }),
});

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
