import { useCallback, useEffect, useRef, useState } from 'react';
import { saveBlob } from '../../../../components/save-text.ts';
import { keepSound } from '../../../../workers/keep-sound-client.ts';
import type { KeepMessage } from '../../../../workers/keep-sound-messages.ts';
import type { KeepPlan } from './keep-plan.ts';

export type KeepState =
  | { readonly kind: 'idle' }
  | { readonly kind: 'working'; readonly share: number }
  | { readonly kind: 'stopped' }
  | (Extract<KeepMessage, { kind: 'done' }> & { readonly plan: KeepPlan })
  | (Extract<KeepMessage, { kind: 'clips' }> & { readonly plan: KeepPlan })
  | Extract<KeepMessage, { kind: 'failed' }>;

/** Makes the file and saves it. What is under way ends with the panel. */
export function useKeep() {
  const [state, setState] = useState<KeepState>({ kind: 'idle' });
  const running = useRef<(() => void) | null>(null);
  const end = () => {
    running.current?.();
    running.current = null;
  };
  useEffect(() => end, []);
  const start = useCallback((plan: KeepPlan) => {
    end();
    setState({ kind: 'working', share: 0 });
    running.current = keepSound(plan.job, (message) => {
      if (message.kind === 'progress') return setState({ kind: 'working', share: message.share });
      running.current = null;
      if (message.kind === 'failed') return setState(message);
      if (message.kind === 'done') saveBlob(plan.fileName, new Blob([message.file], { type: 'audio/wav' }));
      setState({ ...message, plan });
    });
  }, []);
  const stop = useCallback(() => {
    end();
    setState({ kind: 'stopped' });
  }, []);
  return { state, start, stop };
}
