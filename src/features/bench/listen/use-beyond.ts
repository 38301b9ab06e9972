import { useEffect, useState } from 'react';
import type { Sound } from '../../../audio/index.ts';

/** Until a context is open its rate is not known; this is the usual one. */
const usualContextRateHz = 48_000;
/** Counting waits for a pause in the changes, in milliseconds. */
const pauseMs = 400;

export interface Beyond {
  count: number;
  limitHz: number;
}

/** How many lines of the loop are too high for this browser to play. */
export function useBeyond(
  { cycle, sampleRateHz, mode }: Sound,
  contextRateHz = usualContextRateHz,
): Beyond | null {
  const [beyond, setBeyond] = useState<Beyond | null>(null);
  // No line of a table lies above half of its own rate.
  const canBe = mode === 'loop' && sampleRateHz >= contextRateHz && Number.isFinite(sampleRateHz);
  useEffect(() => {
    if (!canBe) return;
    let isOver = false;
    const timer = setTimeout(async () => {
      const { linesBeyond } = await import('../../../audio/player.ts');
      if (!isOver)
        setBeyond({ count: linesBeyond(cycle, sampleRateHz, contextRateHz), limitHz: contextRateHz / 2 });
    }, pauseMs);
    return () => {
      isOver = true;
      clearTimeout(timer);
    };
  }, [canBe, cycle, sampleRateHz, contextRateHz]);
  return canBe && beyond !== null && beyond.count > 0 ? beyond : null;
}
