import { useEffect, useState } from 'react';
import type { Voice } from '../../../../shared/listening/sound.ts';
import { linesBeyond } from './lines-beyond.ts';
import type { Given } from './listening.tsx';

/** Until a context is open its rate is not known; this is the usual one. */
const usualContextRateHz = 48_000;
/** Counting waits for a pause in the changes, in milliseconds. */
const pauseMs = 400;

export interface Beyond {
  /** Of the lines up to half of the table's own rate. */
  readonly count: number;
  readonly limitHz: number;
  readonly form: Voice['form'];
}

/** How many lines of what sounds are too high for this browser to play; images of a staircase are not counted. */
export function useBeyond({ sound, hearing }: Given, contextRateHz = usualContextRateHz): Beyond | null {
  const [beyond, setBeyond] = useState<Beyond | null>(null);
  const voice = sound.voices[hearing];
  const { values, form } = voice;
  const drive = voice.drive ?? sound.drive;
  const rateHz = drive.sampleRateHz;
  // No line of a table lies above half of its own rate.
  const canBe = drive.kind === 'loop' && rateHz >= contextRateHz && Number.isFinite(rateHz);
  useEffect(() => {
    if (!canBe) return;
    const timer = setTimeout(() => {
      setBeyond({ count: linesBeyond(values, rateHz, contextRateHz), limitHz: contextRateHz / 2, form });
    }, pauseMs);
    return () => clearTimeout(timer);
  }, [canBe, values, rateHz, contextRateHz, form]);
  return canBe && beyond !== null && beyond.count > 0 ? beyond : null;
}
