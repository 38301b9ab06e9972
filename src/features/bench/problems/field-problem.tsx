import type { ReactNode } from 'react';
import type { Problem } from '../../../../shared/contract/index.ts';
import { Button } from '../../../components/index.ts';
import { changeDefinition, useBench, useDefinition } from '../state/use-bench.ts';
import { mendsFor } from './mends.ts';

/** A place that a link at the top of the bench can go to. */
export function Spot({ path, children }: { path: string; children: ReactNode }) {
  return <div data-path={path}>{children}</div>;
}

/** What to show beside the field at a path: nothing, or what is wrong with a press to mend it. */
export function useFieldProblem(path: string): ReactNode {
  const problem = useBench(({ problems }) => problems.find((one) => one.path === path));
  return problem === undefined ? undefined : <ProblemWords problem={problem} />;
}

function ProblemWords({ problem }: { problem: Problem }) {
  return (
    <>
      {sayHere(problem)} <MendButtons problem={problem} />
    </>
  );
}

export function MendButtons({ problem }: { problem: Problem }) {
  const definition = useDefinition((whole) => whole);
  const mends = mendsFor(problem, definition);
  if (mends.length === 0) return null;
  return (
    <span className="mends">
      {mends.map(({ label, apply }) => (
        <Button key={label} size="small" onPress={() => changeDefinition(apply)}>
          {label}
        </Button>
      ))}
    </span>
  );
}

/** Says a problem where the field's name stands beside it already. */
export function sayHere({ value, allowed }: Problem): string {
  return `${value === '""' ? 'An empty text' : value} is not allowed. Allowed: ${allowed}.`;
}
