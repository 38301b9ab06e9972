import { useEffect, useRef, useState } from 'react';
import type { Accumulator } from '../../../../shared/playback/index.ts';
import { startFigures, type FiguresRun } from '../../../workers/figures-client.ts';
import type { AccumulatorAnswer } from '../../../workers/figures-messages.ts';

/** More lines than these no screen shows apart. */
const mostLines = 2_000;

export type AccumulatorState =
  | { readonly kind: 'waiting' }
  | { readonly kind: 'failed'; readonly message: string }
  | ({ readonly kind: 'there' } & AccumulatorAnswer);

/** Figures and lines of an accumulator, computed off the main thread; `null` asks for nothing. */
export function useAccumulator(
  values: Float64Array | null,
  accumulator: Accumulator | null,
): AccumulatorState {
  const [state, setState] = useState<AccumulatorState>({ kind: 'waiting' });
  const run = useRef<FiguresRun | null>(null);
  useEffect(() => {
    run.current = startFigures((message) => {
      if (message.kind === 'accumulator') setState({ ...message, kind: 'there' });
      else if (message.kind === 'failed') setState(message);
    });
    return () => run.current?.stop();
  }, []);
  const accumulatorBits = accumulator?.accumulatorBits;
  const stepWord = accumulator?.stepWord;
  useEffect(() => {
    if (values === null || accumulatorBits === undefined || stepWord === undefined) return;
    run.current?.ask({
      kind: 'accumulator',
      values,
      accumulator: { accumulatorBits, stepWord },
      limit: mostLines,
    });
  }, [values, accumulatorBits, stepWord]);
  return state;
}
