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

interface Answered<Name extends Kind> extends Pick<StageState<Name>, 'answer' | 'fault'> {
  /** What was answered. */
  readonly of: StageJob | null;
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
  const [state, setState] = useState<Answered<Name>>({ answer: null, fault: null, of: null });
  const run = useRef<StageRun | null>(null);
  useEffect(() => {
    if (job === null) return;
    run.current ??= startStage((message, of) => {
      if (message.kind === kind) setState({ answer: message as Of<Name>, fault: null, of });
      else if (message.kind === 'failed') setState({ answer: null, fault: message.message, of });
    });
    run.current.ask(job);
  }, [kind, job]);
  // Declared last, so that it ends what the effect above has begun.
  useEffect(
    () => () => {
      run.current?.stop();
      run.current = null;
    },
    [],
  );
  const { answer, fault, of } = state;
  return { answer, fault, isBusy: job !== null && of !== job && fault === null };
}
