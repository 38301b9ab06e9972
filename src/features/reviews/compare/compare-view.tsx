import { useQuery } from '@tanstack/react-query';
import { useMemo, type ReactNode } from 'react';
import type { Revision } from '../../../../shared/contract/index.ts';
import { asProblem } from '../../../api/problem-error.ts';
import type { RevisionAt } from '../../../api/reviews.ts';
import { tableQueries } from '../../../api/tables.ts';
import { Waiting } from '../../../components/index.ts';
import { ProblemNotice } from '../../../forms/problem-notice.tsx';
import { asStored } from '../../../workers/as-stored.ts';
import { useTable } from '../../../workers/use-table.ts';
import { compareCodes } from './code-differences.ts';
import { CodesPart } from './codes-part.tsx';
import { DrawingsPart } from './drawings-part.tsx';
import { FiguresPart, type FiguresOf } from './figures-part.tsx';
import { ListenPart } from './listen-part.tsx';
import { SettingsPart } from './settings-part.tsx';
import { sideNames, type Pair, type Side } from './side.ts';

/** A revision to compare, with the name of its table. */
export interface TitledRevision extends RevisionAt {
  readonly title: string;
}

interface CompareViewProps {
  a: TitledRevision;
  b: TitledRevision;
  figuresOf: FiguresOf;
}

/** All that differs between two revisions, of one table or of two. */
export function CompareView({ a, b, figuresOf }: CompareViewProps) {
  return (
    <WithRevision at={a}>
      {(first) => (
        <WithRevision at={b}>
          {(second) => (
            <Built a={{ at: a, revision: first }} b={{ at: b, revision: second }} figuresOf={figuresOf} />
          )}
        </WithRevision>
      )}
    </WithRevision>
  );
}

function WithRevision({ at, children }: { at: TitledRevision; children: (revision: Revision) => ReactNode }) {
  const { data, error, refetch } = useQuery(tableQueries.revision(at.team, at.table, at.number));
  if (error) return <ProblemNotice fault={asProblem(error)} onTryAgain={() => void refetch()} />;
  if (data === undefined) return <Waiting>Reading revision {at.number}…</Waiting>;
  return children(data);
}

interface Stored {
  readonly at: TitledRevision;
  readonly revision: Revision;
}

function Built({ a, b, figuresOf }: { a: Stored; b: Stored; figuresOf: FiguresOf }) {
  const [first, second] = [useSide(a), useSide(b)];
  if (typeof first === 'string' || typeof second === 'string') {
    return <Waiting>{[first, second].find((each) => typeof each === 'string')}</Waiting>;
  }
  return <Parts a={first} b={second} figuresOf={figuresOf} />;
}

/** The revision as it was stored, or words about what is still missing. */
function useSide({ at: { table: slug, title }, revision }: Stored): Side | string {
  const built = useTable(revision.definition);
  return useMemo(() => {
    if (built === null) return 'Building the table…';
    if ('fault' in built) return built.fault;
    return { slug, title, revision, table: asStored(built.table, revision) };
  }, [built, slug, title, revision]);
}

function Parts({ a, b, figuresOf }: Pair & { figuresOf: FiguresOf }) {
  const pair = useMemo(() => ({ a, b }), [a, b]);
  const compared = useMemo(() => compareCodes(a.table, b.table), [a.table, b.table]);
  const names = sideNames({ a: numbered(a), b: numbered(b) });
  return (
    <div className="compare-parts">
      <SettingsPart pair={pair} names={names} />
      <DrawingsPart pair={pair} names={names} compared={compared} />
      <CodesPart pair={pair} names={names} compared={compared} />
      <FiguresPart pair={pair} names={names} figuresOf={figuresOf} />
      <ListenPart pair={pair} names={names} />
    </div>
  );
}

const numbered = ({ slug, title, revision: { number } }: Side) => ({ slug, title, number });
