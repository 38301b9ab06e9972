import type { Definition } from '../../shared/contract/index.ts';
import type { Matched } from '../../shared/listening/equal-loudness.ts';
import type { PredictedLine } from '../../shared/listening/predicted-lines.ts';
import type { Drive, Voice } from '../../shared/listening/sound.ts';
import type { BitMask, BitsOffFigures, CodedTable } from '../../shared/listening/bits-off.ts';
import type { Accumulator, AccumulatorFigures, AccumulatorLines } from '../../shared/playback/index.ts';
import type { SizeAxes, SizeCell } from '../../shared/size-search/index.ts';

/** What the worker of longer computations is asked. */
export type FiguresJob =
  | {
      readonly kind: 'accumulator';
      /** What the codes stand for, q. */
      readonly values: Float64Array;
      readonly accumulator: Accumulator;
      /** Lines listed at most. */
      readonly limit: number;
    }
  | { readonly kind: 'sizes'; readonly definition: Definition; readonly axes: SizeAxes }
  | {
      readonly kind: 'bits';
      /** Comes back with the answer. */
      readonly id: number;
      readonly coded: CodedTable;
      readonly masks: readonly BitMask[];
    }
  | {
      readonly kind: 'loudness';
      /** Comes back with the answer. */
      readonly id: number;
      readonly a: Voice;
      readonly b: Voice;
      readonly drive: Drive;
      readonly contextRateHz: number;
      /** Gain of where it is heard at each whole hertz; null where that is straight. */
      readonly everyHz: Float64Array | null;
    }
  | {
      readonly kind: 'predicted';
      /** Comes back with the answer. */
      readonly id: number;
      readonly voice: Voice;
      readonly drive: Drive;
      readonly contextRateHz: number;
      /** Lines listed at most. */
      readonly most: number;
    };

export interface AccumulatorAnswer {
  readonly figures: AccumulatorFigures;
  readonly lines: AccumulatorLines;
}

export interface BitsAnswer {
  readonly id: number;
  readonly figures: readonly (readonly [BitMask, BitsOffFigures])[];
}

/** What it answers: cells as they are found, and at the end that it is done. */
export type FiguresMessage =
  | ({ readonly kind: 'accumulator' } & AccumulatorAnswer)
  | { readonly kind: 'cells'; readonly cells: readonly SizeCell[] }
  | ({ readonly kind: 'bits' } & BitsAnswer)
  | { readonly kind: 'loudness'; readonly id: number; readonly matched: Matched }
  | { readonly kind: 'predicted'; readonly id: number; readonly lines: readonly PredictedLine[] }
  | { readonly kind: 'done' }
  | { readonly kind: 'failed'; readonly message: string };
