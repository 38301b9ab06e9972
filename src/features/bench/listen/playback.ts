import type { Playback } from '../state/wave.ts';

export { playbackSchema, type Playback } from '../state/wave.ts';

/** A loop at concert pitch's A, 440 Hz (ISO 16). */
export const defaultPlayback: Playback = { mode: 'loop', by: 'tone', toneHz: 440, sampleRateHz: 32_000 };
