import { useEffect, useState } from 'react';
import { Refusal, sayProblem, type Problem } from '../../../../shared/contract/index.ts';
import { createImportsWorker, type ImportsWorker } from '../../../workers/imports-client.ts';

/** A worker for as long as the component is there. */
export function useImportsWorker(): ImportsWorker {
  const [worker] = useState(createImportsWorker);
  useEffect(() => () => worker.stop(), [worker]);
  return worker;
}

/** What is wrong, one line each. */
export function faultsOf(error: unknown): readonly string[] {
  if (error instanceof Refusal) return error.problems.map(sayFault);
  return [error instanceof Error ? error.message : String(error)];
}

/** As everywhere, but a place in a text reads better with a capital. */
export const sayFault = (problem: Problem): string => {
  const said = sayProblem(problem);
  return `${said[0].toUpperCase()}${said.slice(1)}.`;
};

type Outcome<Result> = {
  readonly of: unknown;
  readonly result: Result | null;
  readonly faults: readonly string[];
};

/**
 * The newest answer to work that follows what is typed. While a newer one is on its way the last one stays.
 *
 * @param request what the work depends on: it is done again where this is another
 */
export function useAnswer<Request, Result>(
  request: Request,
  work: (request: Request) => Promise<Result>,
): { result: Result | null; faults: readonly string[] } {
  const [outcome, setOutcome] = useState<Outcome<Result>>({ of: null, result: null, faults: [] });
  const key = JSON.stringify(request);
  useEffect(() => {
    let isOver = false;
    work(request).then(
      (result) => {
        if (!isOver) setOutcome({ of: key, result, faults: [] });
      },
      (error: unknown) => {
        if (!isOver) setOutcome({ of: key, result: null, faults: faultsOf(error) });
      },
    );
    return () => {
      isOver = true;
    };
    // The request is told by its text; the work is the same function of it each time.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [key]);
  return outcome;
}
