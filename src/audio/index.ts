// Small enough for the first page. What makes sound is in preview.ts, which is imported when play is first pressed.
export { levelCapDbfs, loudestDbfs, volumeRangeDb } from './levels.ts';
export { openAudioContext } from './open-context.ts';
export { sampleRateOfTone, toneOfSampleRate, type TableShape } from './playback-rate.ts';
export type { MeterReading } from './meter.ts';
export type { AudioPreview, PreviewState } from './preview.ts';
export type { Hearing, Sound } from './sound.ts';
