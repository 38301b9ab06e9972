import { memo, useDeferredValue, useMemo } from 'react';
import { Figure, FigureStrip } from '../../../components/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { sameValue } from '../state/same-value.ts';
import { useIsWide } from '../view/use-is-wide.ts';
import { figureGroupsOf, type FigureGroup } from './figures.ts';
import type { ShownFigure } from './shown-figure.ts';

/**
 * The figures in four courses. They follow the drawings, which are drawn first while something is dragged. Where
 * there is little room all but the first course wait behind a press.
 */
export const FigureStrips = memo(function FigureStrips({ table }: { table: TableAnswer }) {
  const shown = useDeferredValue(table);
  const isWide = useIsWide();
  const courses = useMemo(
    () => figureGroupsOf(shown).map((group) => <Course key={group.title} group={group} />),
    [shown],
  );
  if (isWide) return courses;
  const [first, ...others] = courses;
  return (
    <>
      {first}
      <details className="more-figures">
        <summary>More figures</summary>
        {others}
      </details>
    </>
  );
});

function Course({ group: { title, note, figures } }: { group: FigureGroup }) {
  return (
    <section className="figure-course">
      <h3>{title}</h3>
      {note !== undefined && <p className="figure-note">{note}</p>}
      <FigureStrip label={title}>
        {figures.map((figure) => (
          <OneFigure key={figure.id} figure={figure} />
        ))}
      </FigureStrip>
    </section>
  );
}

/** While something is dragged most figures keep what they say. */
const OneFigure = memo(function OneFigure({
  figure: { label, value, unit, tone, ...words },
}: {
  figure: ShownFigure;
}) {
  return (
    <Figure label={label} value={value} unit={unit} tone={tone ?? 'plain'} explain={<Words {...words} />} />
  );
}, sameValue);

function Words({
  meaning,
  missing,
  formula,
  good,
}: Pick<ShownFigure, 'meaning' | 'missing' | 'formula' | 'good'>) {
  return (
    <>
      <p>{meaning}</p>
      {missing !== undefined && (
        <p>
          <strong>It does not exist here.</strong> {missing}
        </p>
      )}
      <p>
        <strong>Computed as</strong> <code>{formula}</code>
      </p>
      <p>
        <strong>What is good.</strong> {good}
      </p>
    </>
  );
}
