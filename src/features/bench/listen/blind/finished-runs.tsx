import { useEffect, useRef } from 'react';
import { scoreOf } from '../../../../../shared/listening/index.ts';
import { Button, icons } from '../../../../components/index.ts';
import { useCopy } from '../../../../components/code/use-copy.ts';
import type { FinishedTest } from './blind-store.ts';
import { resultText, sayChance, sayMeaning, sayTurnedDown } from './words.ts';

/** Runs that are over, newest first, each with its key. */
export function FinishedRuns({ finished }: { finished: readonly FinishedTest[] }) {
  const section = useRef<HTMLElement>(null);
  const newest = finished[0]?.id;
  useEffect(() => {
    // The buttons of the run that has just ended are gone, and the focus with them.
    if (newest !== undefined && document.activeElement === document.body) section.current?.focus();
  }, [newest]);
  if (finished.length === 0) return null;
  return (
    <section ref={section} tabIndex={-1} className="space-y-2" aria-label="Finished runs">
      <h4>{finished.length === 1 ? 'The run' : 'Runs, newest first'}</h4>
      {finished.map((test) => (
        <FinishedRun key={test.id} test={test} />
      ))}
    </section>
  );
}

function FinishedRun({ test }: { test: FinishedTest }) {
  const { run, words, wave, loudness } = test;
  const { right, of, byGuessing } = scoreOf(run);
  const copy = useCopy();
  return (
    <article className="blind-run" aria-label={`Run ${test.id}`}>
      <p className="blind-score">
        <strong>
          {right} of {of} right
        </strong>
        {of > 0 && <> · by guessing {sayChance(byGuessing)}</>}
      </p>
      <p className="field-description">
        {wave}: A {words.a}, B {words.b}. {sayMeaning(test)}
      </p>
      <details className="blind-key">
        <summary>The key</summary>
        <p className="field-description">
          Probability of {right} or more right of {of} by guessing: {byGuessing.toPrecision(3)}. {run.trials}{' '}
          trials were chosen beforehand. {sayTurnedDown(loudness)}
        </p>
        {of > 0 && (
          <table className="blind-table">
            <thead>
              <tr>
                <th scope="col">Trial</th>
                <th scope="col">X was</th>
                <th scope="col">taken for</th>
                <th scope="col" />
              </tr>
            </thead>
            <tbody>
              {run.answered.map(({ x, said }, i) => (
                <tr key={i}>
                  <th scope="row">{i + 1}</th>
                  <td>{x.toUpperCase()}</td>
                  <td>{said.toUpperCase()}</td>
                  <td>{x === said ? 'right' : 'wrong'}</td>
                </tr>
              ))}
            </tbody>
          </table>
        )}
      </details>
      <Button size="small" icon={icons.copy} onPress={() => void copy(resultText(test), 'The result is')}>
        Copy as text
      </Button>
    </article>
  );
}
