import type { ReactNode } from 'react';
import { sayProblem } from '../../shared/contract/index.ts';
import { askToSignIn } from '../api/sign-in-again.ts';
import type { ProblemError } from '../api/problem-error.ts';
import { Button, Notice } from '../components/index.ts';

export interface ProblemNoticeProps {
  fault: ProblemError | null;
  /** Paths whose problems stand beside their fields. */
  shownElsewhere?: readonly string[];
  /** Tries again what failed; offered where that may help. */
  onTryAgain?: () => void;
  actions?: ReactNode;
}

/** What kept something from being done, and what can be done about it. */
export function ProblemNotice({ fault, shownElsewhere = [], onTryAgain, actions }: ProblemNoticeProps) {
  if (fault === null) return null;
  const others = fault.problems.filter(({ path }) => !shownElsewhere.includes(path));
  if (fault.problems.length > 0 && others.length === 0) return null;
  const mayTryAgain = onTryAgain !== undefined && (fault.isPassing || fault.status === 401);
  const tryAgain = async () => {
    if (fault.status === 401 && !(await askToSignIn())) return;
    onTryAgain?.();
  };
  return (
    <Notice
      tone="fault"
      actions={
        (mayTryAgain || actions) && (
          <>
            {mayTryAgain && (
              <Button size="small" onPress={() => void tryAgain()}>
                {fault.status === 401 ? 'Sign in and try again' : 'Try again'}
              </Button>
            )}
            {actions}
          </>
        )
      }
    >
      {others.length === 0 ? (
        fault.message
      ) : (
        <ul>
          {others.map((problem) => (
            <li key={problem.path}>{sayProblem(problem)}</li>
          ))}
        </ul>
      )}
    </Notice>
  );
}
