import type { Problem } from '../../../../shared/contract/index.ts';
import { Button, icons } from '../../../components/index.ts';
import { sayHere } from '../problems/field-problem.tsx';
import { nameOfField } from '../problems/field-names.ts';

/** What the target cannot take of the definition; what is wrong with an option stands beside that. */
export function ExportProblems({
  problems,
  onGoTo,
}: {
  problems: readonly Problem[];
  onGoTo: (path: string) => void;
}) {
  const ofDefinition = problems.filter(({ path }) => !path.startsWith('options.'));
  return (
    <div role="status">
      {ofDefinition.length > 0 && (
        <section className="slab slab-oxide" aria-label="What the target cannot take">
          <icons.fault className="slab-sign" />
          <ul>
            {ofDefinition.map((problem) => (
              <li key={problem.path}>
                <Button size="small" variant="quiet" onPress={() => onGoTo(problem.path)}>
                  {nameOfField(problem.path)}
                </Button>
                : {sayHere(problem)}
              </li>
            ))}
          </ul>
        </section>
      )}
    </div>
  );
}
