import { useMemo } from 'react';
import { Explain, Panel, icons } from '../../../components/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { compareFigures, type FigureDifference, type Judgement } from './figure-differences.ts';
import type { Pair } from './side.ts';

/** What a figure means, as the bench explains it. */
export interface ExplainedFigure {
  readonly id: string;
  readonly meaning: string;
  readonly formula: string;
  readonly good: string;
}

/** The bench's own figures; the router hands them over. */
export type FiguresOf = (table: TableAnswer) => readonly { readonly figures: readonly ExplainedFigure[] }[];

interface FiguresPartProps {
  pair: Pair;
  names: { a: string; b: string };
  figuresOf: FiguresOf;
}

const looks = {
  better: { words: 'better', Sign: icons.arrowUp },
  worse: { words: 'worse', Sign: icons.arrowDown },
  other: { words: 'differs', Sign: icons.wave },
  same: { words: 'the same', Sign: null },
} as const satisfies Record<Judgement, unknown>;

/** Every figure of both, with the difference and whether it is better. */
export function FiguresPart({ pair: { a, b }, names, figuresOf }: FiguresPartProps) {
  const rows = useMemo(
    () =>
      compareFigures(
        { definition: a.revision.definition, report: a.revision.report },
        { definition: b.revision.definition, report: b.revision.report },
      ),
    [a.revision, b.revision],
  );
  const explained = useMemo(
    () => new Map(figuresOf(b.table).flatMap(({ figures }) => figures.map((figure) => [figure.id, figure]))),
    [figuresOf, b.table],
  );
  const count = (judgement: Judgement) => rows.filter((row) => row.judgement === judgement).length;
  return (
    <Panel title={`Figures: ${count('better')} better, ${count('worse')} worse`}>
      <table className="ledger figure-rows">
        <caption className="sr-only">
          Figures of {names.a} and of {names.b}
        </caption>
        <thead>
          <tr>
            <th scope="col">Figure</th>
            <th scope="col" className="is-number">
              {names.a}
            </th>
            <th scope="col" className="is-number">
              {names.b}
            </th>
            <th scope="col" className="is-number">
              Difference
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <FigureRow key={row.id} row={row} explained={explained.get(row.id)} />
          ))}
        </tbody>
      </table>
    </Panel>
  );
}

function FigureRow({ row, explained }: { row: FigureDifference; explained: ExplainedFigure | undefined }) {
  const { label, unit, before, after, difference, judgement } = row;
  const { words, Sign } = looks[judgement];
  return (
    <tr data-judgement={judgement}>
      <th scope="row">
        <span className="figure-name">
          <span>
            {label} {unit !== '' && <span className="quiet">{unit}</span>}
          </span>
          {explained !== undefined && (
            <Explain title={label}>
              <p>{explained.meaning}</p>
              <p>
                <strong>Computed as</strong> <code>{explained.formula}</code>
              </p>
              <p>
                <strong>What is good.</strong> {explained.good}
              </p>
            </Explain>
          )}
        </span>
      </th>
      <td className="is-number">{before}</td>
      <td className="is-number">{after}</td>
      <td className="is-number">
        <span className="figure-change">
          {difference}
          <span className="judgement" data-judgement={judgement}>
            {Sign !== null && <Sign width="16" height="16" />}
            {words}
          </span>
        </span>
      </td>
    </tr>
  );
}
