import { Button, icons } from '../../../components/index.ts';
import { theBench, useBench } from '../state/use-bench.ts';
import { MendButtons, sayHere } from './field-problem.tsx';
import { nameOfField } from './field-names.ts';

/** More than these are counted, not listed. */
const mostListed = 5;

/** Everything that keeps the draft from being built, each with a link to its field. */
export function ProblemSummary({ onGoTo }: { onGoTo: (path: string) => void }) {
  const problems = useBench((state) => state.problems);
  const failure = useBench((state) => state.failure);
  return (
    <div role="status">
      {problems.length > 0 && (
        <section className="slab slab-oxide" aria-label="What is wrong">
          <icons.fault className="slab-sign" />
          <div>
            <strong>The drawings show the last wave that could be built.</strong>
            <ul className="mt-1 space-y-1">
              {problems.slice(0, mostListed).map((problem, index) => (
                <li key={index}>
                  <a
                    href={`#${problem.path}`}
                    onClick={(event) => {
                      event.preventDefault();
                      onGoTo(problem.path);
                    }}
                  >
                    {nameOfField(problem.path)}
                  </a>
                  : {sayHere(problem)} <MendButtons problem={problem} />
                </li>
              ))}
            </ul>
            {problems.length > mostListed && <p>And {problems.length - mostListed} more.</p>}
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
