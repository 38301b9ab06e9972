import type { Definition } from '../../shared/contract/index.ts';
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
  | { readonly kind: 'sizes'; readonly definition: Definition; readonly axes: SizeAxes };

export interface AccumulatorAnswer {
  readonly figures: AccumulatorFigures;
  readonly lines: AccumulatorLines;
}

/** What it answers: cells as they are found, and at the end that it is done. */
export type FiguresMessage =
  | ({ readonly kind: 'accumulator' } & AccumulatorAnswer)
  | { readonly kind: 'cells'; readonly cells: readonly SizeCell[] }
  | { readonly kind: 'done' }
  | { readonly kind: 'failed'; readonly message: string };
