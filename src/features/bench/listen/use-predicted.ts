import { useEffect, useMemo, useRef, useState } from 'react';
import type { PredictedLine } from '../../../../shared/listening/predicted-lines.ts';
import { outputGain } from '../../../audio/levels.ts';
import { startFigures, type FiguresRun } from '../../../workers/figures-client.ts';
import { useListenControls, useListening, type Given } from './listening.tsx';

/** Until a context is open its rate is not known; this is the usual one. */
const usualContextRateHz = 48_000;
/** Predicting waits for a pause in the changes, in milliseconds. */
const pauseMs = 120;
/** More lines than these no screen shows apart. */
const mostLines = 1_000;

export interface Predicted {
  /** In rising order; amplitudes as they leave the browser, full scale 1. */
  readonly lines: readonly PredictedLine[];
  /** Half of the rate at which the browser plays. */
  readonly limitHz: number;
  /** Why there are none, in words; null where there can be. */
  readonly whyNone: string | null;
}

const noLines: readonly PredictedLine[] = [];

/** The lines that what sounds must have, by the table's spectrum, the volume and where it is heard. */
export function usePredicted(): Predicted {
  const { sounding, preview, volumeDb, device } = useListening();
  const rateHz = preview?.contextRateHz ?? usualContextRateHz;
  const whyNone = whyNoLines(sounding);
  const [failure, setFailure] = useState<string | null>(null);
  const ofVoice = useVoiceLines(whyNone === null ? sounding : null, rateHz, setFailure);
  return useMemo(() => {
    const gain = outputGain(volumeDb);
    const lines = ofVoice.map(({ hz, amplitude }) => ({
      hz,
      amplitude: amplitude * gain * (device?.response(hz) ?? 1),
    }));
    return { lines, limitHz: rateHz / 2, whyNone: whyNone ?? failure };
  }, [ofVoice, volumeDb, device, rateHz, whyNone, failure]);
}

/** Lines of the voice that is heard, full scale ±1, computed off the main thread; `null` asks for nothing. */
function useVoiceLines(
  given: Given | null,
  contextRateHz: number,
  onFailure: (why: string | null) => void,
): readonly PredictedLine[] {
  const { isInSight } = useListenControls();
  const [lines, setLines] = useState(noLines);
  const run = useRef<FiguresRun | null>(null);
  const asked = useRef(0);
  const voice = given?.sound.voices[given.hearing];
  const drive = voice?.drive ?? given?.sound.drive;
  useEffect(() => {
    if (!isInSight || voice === undefined || drive === undefined) return;
    const timer = setTimeout(() => {
      run.current ??= startFigures((message) => {
        if (message.kind === 'failed') onFailure(`The lines could not be predicted: ${message.message}`);
        if (message.kind !== 'predicted' || message.id !== asked.current) return;
        setLines(message.lines);
        onFailure(null);
      });
      asked.current += 1;
      run.current.ask({ kind: 'predicted', id: asked.current, voice, drive, contextRateHz, most: mostLines });
    }, pauseMs);
    return () => clearTimeout(timer);
  }, [isInSight, voice, drive, contextRateHz, onFailure]);
  // Declared last, so that it ends what the effect above has begun.
  useEffect(
    () => () => {
      run.current?.stop();
      run.current = null;
    },
    [],
  );
  return voice === undefined ? noLines : lines;
}

/** Why nothing can be predicted of what sounds, in words; null where it can. */
function whyNoLines({ sound, hearing, score }: Given): string | null {
  const { kind, sampleRateHz } = sound.voices[hearing].drive ?? sound.drive;
  if (!(sampleRateHz > 0 && Number.isFinite(sampleRateHz)))
    return 'Without a sample rate there are no lines.';
  if (kind === 'once') return 'One pass has no lines of its own to predict.';
  const moves = score?.events.some(({ toneHz, stepWord }) => toneHz !== undefined || stepWord !== undefined);
  return moves === true ? 'Its pitch moves, so that no lines are predicted.' : null;
}
