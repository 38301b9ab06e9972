// Small enough for the first page. What makes sound is in player.ts, which is imported beside the page.
export { levelCapDbfs, loudestDbfs, volumeRangeDb } from './levels.ts';
export { openAudioContext } from './open-context.ts';
export { sampleRateOfTone, toneOfSampleRate, type TableShape } from './playback-rate.ts';
export { tableSound, type HeardTable } from './sound.ts';
export type { MeterReading } from './meter.ts';
export type { AudioPreview, PreviewState } from './preview.ts';
export type { Drive, Score, ScoreEvent, Sound, Voice } from './sound.ts';
