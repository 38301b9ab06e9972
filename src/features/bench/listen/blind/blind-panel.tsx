import './blind.css';
import { scoreOf } from '../../../../../shared/listening/index.ts';
import { useLive } from '../../../../live/index.ts';
import { blindStore, type FinishedTest } from './blind-store.ts';
import { FinishedRuns } from './finished-runs.tsx';
import { Setup } from './setup.tsx';
import { Trial } from './trial.tsx';

/** Whether two sounds can be told apart by ear alone. */
export function BlindPanel() {
  const { running, finished } = useLive(blindStore);
  return (
    <>
      <p role="status" className="sr-only">
        {running === null && finished.length > 0 && sayOver(finished[0])}
      </p>
      {running === null ? <Setup /> : <Trial test={running} />}
      {running === null && <FinishedRuns finished={finished} />}
    </>
  );
}

function sayOver({ id, run }: FinishedTest): string {
  const { right, of } = scoreOf(run);
  return `Run ${id} is over: ${right} of ${of} right.`;
}
