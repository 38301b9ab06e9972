import { useCallback } from 'react';
import type { Source } from '../../../shared/contract/index.ts';
import { BringIn } from './import/index.ts';
import { ShapeFlight, sayInWords } from './shape/index.ts';
import { changeDefinition, useBench, useDefinition } from './state/use-bench.ts';
import { later } from './view/later.tsx';
import { Recess } from './view/recess.tsx';

const FadeStarts = later('the fades', async () => (await import('./shape/fades/fade-starts.tsx')).FadeStarts);

/** The shape flight, tied to the definition on the bench. */
export function BenchShape() {
  const source = useDefinition((definition) => definition.source);
  const { length, cycles, range } = useDefinition((definition) => definition.table);
  const problems = useBench((state) => state.problems);
  const change = useCallback(
    (next: Source, how?: { coalesce?: string }) =>
      changeDefinition((definition) => ({ ...definition, source: next }), how?.coalesce),
    [],
  );
  return (
    <div className="space-y-4">
      <BringIn />
      <ShapeFlight
        {...{ source, problems, cycles, range }}
        onChange={change}
        tableLength={length}
        moreStarts={
          <Recess id="fades" title="Lamp fades" summary="Even to the eye, exponential or linear">
            <FadeStarts tableLength={length} onStart={changeDefinition} />
          </Recess>
        }
      />
    </div>
  );
}

/** What the wave is made of, in one line. */
export function ShapeSummary() {
  return sayInWords(useDefinition((definition) => definition.source));
}
