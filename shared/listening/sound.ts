import type { StageParts } from '../output-stage/index.ts';

/** How entries leave the part, one each period of the sample rate. */
export type Drive =
  | { readonly kind: 'loop' | 'once'; readonly sampleRateHz: number }
  /** Bits M and step word W of engine specification §5; the table's length is a power of two. */
  | {
      readonly kind: 'accumulator';
      readonly sampleRateHz: number;
      readonly accumulatorBits: number;
      readonly stepWord: number;
    };

export interface Voice {
  /** One value an entry, full scale ±1: a unipolar table's come doubled. Their mean is not played. */
  readonly values: Float64Array;
  /** Cycles of the wave in the table, K. */
  readonly cycles: number;
  /** `curve`: the smooth curve through the entries; `staircase`: what a pin holds, with its images. */
  readonly form: 'curve' | 'staircase';
  /** What follows the converter. */
  readonly stage?: StageParts;
  /** Linear; 1 where absent. */
  readonly gain?: number;
  /** Where this voice is driven otherwise than the sound: another sample rate, another length. */
  readonly drive?: Drive;
}

/** Voices that sound in step, of which one is heard at a time. */
export interface Sound {
  readonly voices: Readonly<Record<string, Voice>>;
  readonly drive: Drive;
}

/** One thing that happens while a sound plays. What is absent stays as it was. */
export interface ScoreEvent {
  /** From the moment the score was handed over, or began again. */
  readonly atSeconds: number;
  /** Whether it sounds from here on; it comes and goes with a short ramp. */
  readonly gate?: boolean;
  /** Tone of a loop. */
  readonly toneHz?: number;
  /** Step word of an accumulator. */
  readonly stepWord?: number;
}

/** What happens while a sound plays, by the audio clock. */
export interface Score {
  /** In rising order of time. */
  readonly events: readonly ScoreEvent[];
  /** Begins again after so many seconds; once where absent. */
  readonly repeatSeconds?: number;
}
