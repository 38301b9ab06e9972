import type { ReactNode } from 'react';
import { Button, icons, useUnreadFields } from '../../../components/index.ts';
import { theBench, useBench } from '../state/use-bench.ts';
import { MendButtons, sayHere } from './field-problem.tsx';
import { nameOfField } from './field-names.ts';

/** More than these are counted, not listed. */
const mostListed = 5;

interface ProblemSummaryProps {
  onGoTo: (path: string) => void;
  /** Goes to a field by the id of its input. */
  onGoToInput: (inputId: string) => void;
}

/** Everything that keeps the draft from being built, and what no draft could take up, each with a link to its field. */
export function ProblemSummary({ onGoTo, onGoToInput }: ProblemSummaryProps) {
  const problems = useBench((state) => state.problems);
  const failure = useBench((state) => state.failure);
  const unread = useUnreadFields();
  return (
    <div role="status">
      {(problems.length > 0 || unread.length > 0) && (
        <section className="slab slab-oxide" aria-label="What is wrong">
          <icons.fault className="slab-sign" />
          <div className="space-y-2">
            {problems.length > 0 && (
              <Listed title="The drawings show the last wave that could be built." count={problems.length}>
                {problems.slice(0, mostListed).map((problem, index) => (
                  <li key={index}>
                    <GoTo to={problem.path} onGo={onGoTo}>
                      {nameOfField(problem.path)}
                    </GoTo>
                    : {sayHere(problem)} <MendButtons problem={problem} />
                  </li>
                ))}
              </Listed>
            )}
            {unread.length > 0 && (
              <Listed title="What was typed here is not taken; the last number counts." count={unread.length}>
                {unread.slice(0, mostListed).map(({ inputId, label, fault }) => (
                  <li key={inputId}>
                    <GoTo to={inputId} onGo={onGoToInput}>
                      {label}
                    </GoTo>
                    : {fault}.
                  </li>
                ))}
              </Listed>
            )}
          </div>
        </section>
      )}
      {failure !== null && (
        <section className="slab slab-oxide" aria-label="The engine broke down">
          <icons.fault className="slab-sign" />
          <div>
            <p>{failure} Nothing that you set is lost.</p>
            <Button size="small" onPress={() => theBench().tryAgain()}>
              Build it again
            </Button>
          </div>
        </section>
      )}
    </div>
  );
}

function Listed({ title, count, children }: { title: string; count: number; children: ReactNode }) {
  return (
    <div>
      <strong>{title}</strong>
      <ul className="mt-1 space-y-1">{children}</ul>
      {count > mostListed && <p>And {count - mostListed} more.</p>}
    </div>
  );
}

function GoTo({ to, onGo, children }: { to: string; onGo: (to: string) => void; children: ReactNode }) {
  return (
    <a
      href={`#${to}`}
      onClick={(event) => {
        event.preventDefault();
        onGo(to);
      }}
    >
      {children}
    </a>
  );
}
