import { useEffect, useMemo, useRef, useState } from 'react';
import type { Matched } from '../../../../../shared/listening/index.ts';
import { startFigures, type FiguresRun } from '../../../../workers/figures-client.ts';
import { useListening } from '../listening.tsx';
import type { Pair } from './blind-store.ts';

/** Until a context is open its rate is not known; this is the usual one. */
const usualContextRateHz = 48_000;

export type MatchedState =
  { readonly kind: 'waiting' } | { readonly kind: 'failed'; readonly fault: string } | Matched;

interface Answered {
  readonly of: object;
  readonly state: MatchedState;
}

const waiting: MatchedState = { kind: 'waiting' };

/** A pair at equal loudness, measured off the main thread for this browser's rate and where it is heard. */
export function useMatched(pair: Pair | null): MatchedState {
  const { preview, device } = useListening();
  const contextRateHz = preview?.contextRateHz ?? usualContextRateHz;
  const job = useMemo(
    () =>
      pair === null ? null : { ...pair, contextRateHz, everyHz: gainsOf(device?.response, contextRateHz) },
    [pair, contextRateHz, device],
  );
  const [answered, setAnswered] = useState<Answered | null>(null);
  const run = useRef<FiguresRun | null>(null);
  const asked = useRef<{ id: number; of: object }>({ id: 0, of: waiting });

  useEffect(() => {
    run.current = startFigures((message) => {
      const { id, of } = asked.current;
      if (message.kind === 'failed') setAnswered({ of, state: { kind: 'failed', fault: message.message } });
      if (message.kind === 'loudness' && message.id === id) setAnswered({ of, state: message.matched });
    });
    return () => run.current?.stop();
  }, []);
  useEffect(() => {
    if (job === null) return;
    asked.current = { id: asked.current.id + 1, of: job };
    run.current?.ask({ kind: 'loudness', id: asked.current.id, ...job });
  }, [job]);

  return job !== null && answered?.of === job ? answered.state : waiting;
}

/** A response as numbers that can be sent to a worker: its gain at each whole hertz up to half of a rate. */
function gainsOf(response: ((hz: number) => number) | undefined, contextRateHz: number): Float64Array | null {
  if (response === undefined) return null;
  return Float64Array.from({ length: Math.ceil(contextRateHz / 2) + 1 }, (_, hz) =>
    response(Math.max(1, hz)),
  );
}
