import type { z } from 'zod';
import type { Definition, playbackSettingsSchema } from '../../../../shared/contract/index.ts';
import { toneOfSampleRate } from '../../../audio/index.ts';

type PlaybackSettings = z.infer<typeof playbackSettingsSchema>;

/** Tone of a wave that was saved without saying how it is listened to, in hertz. */
const plainToneHz = 220;

/** The tone in hertz that a revision was listened to with. */
export function toneOf(
  playback: PlaybackSettings | null,
  { length, cycles }: Pick<Definition['table'], 'length' | 'cycles'>,
): number {
  if (playback === null) return plainToneHz;
  return playback.by === 'tone'
    ? playback.toneHz
    : toneOfSampleRate(playback.sampleRateHz, { tableLength: length, tableCycles: cycles });
}
