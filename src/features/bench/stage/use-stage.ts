import { useEffect, useRef, useState } from 'react';
import { startStage, type StageRun } from '../../../workers/stage-client.ts';
import type { StageJob, StageMessage } from '../../../workers/stage-messages.ts';

type Kind = Exclude<StageMessage['kind'], 'failed'>;
type Of<Name extends Kind> = Extract<StageMessage, { kind: Name }>;

export interface StageState<Name extends Kind> {
  /** The newest answer; it stays while another one is computed. */
  readonly answer: Of<Name> | null;
  readonly fault: string | null;
  readonly isBusy: boolean;
}

/**
 * Has one job done off the main thread, and again with each new one; `null` asks for nothing.
 *
 * @param job the same object as long as it asks for the same
 */
export function useStage<Name extends Kind>(
  kind: Name,
  job: Extract<StageJob, { kind: Name }> | null,
): StageState<Name> {
  const [state, setState] = useState<StageState<Name>>({ answer: null, fault: null, isBusy: true });
  const run = useRef<StageRun | null>(null);
  useEffect(() => {
    run.current = startStage((message) => {
      if (message.kind === kind) setState({ answer: message as Of<Name>, fault: null, isBusy: false });
      else if (message.kind === 'failed') setState({ answer: null, fault: message.message, isBusy: false });
    });
    return () => run.current?.stop();
  }, [kind]);
  useEffect(() => {
    if (job === null) return;
    setState((before) => (before.isBusy ? before : { ...before, isBusy: true }));
    run.current?.ask(job);
  }, [job]);
  return state;
}
