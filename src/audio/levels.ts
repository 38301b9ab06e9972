/**
 * The loudest that the preview can be, in dBFS: a wave-shaper after the volume holds every sample to it. Half of
 * full scale; at volume 0 dB a full-scale table peaks 6 dB below it, which leaves room for the overshoot of a
 * band-limited edge, so that it never sounds in ordinary use.
 */
export const levelCapDbfs = -6.02;
export const levelCap = 0.5;

/** Peak of a full-scale table at volume 0 dB, in dBFS. */
export const loudestDbfs = -12;

/** Volume in dB relative to `loudestDbfs`. It starts so that full scale peaks at −18 dBFS. */
export const volumeRangeDb = { min: -60, max: 0, start: -6 } as const;

export function gainOfDb(db: number): number {
  return 10 ** (db / 20);
}

export function dbOfGain(gain: number): number {
  return 20 * Math.log10(gain);
}

/** Gain from a table's full scale of ±1 to the output. */
export function outputGain(volumeDb: number): number {
  return gainOfDb(loudestDbfs + volumeDb);
}
