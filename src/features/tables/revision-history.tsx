import { useInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { RevisionSummary } from '../../../shared/contract/index.ts';
import { asProblem } from '../../api/problem-error.ts';
import { tableQueries, type TaggedTable } from '../../api/tables.ts';
import { Button, Moment, Panel, Waiting } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { comparePath, openRevisionPath, revisionText, tablePath } from '../../paths.ts';
import { sayBytes, saySize, saySnr } from './say-figures.ts';
import { StateWord } from '../../components/state-word.tsx';
import { useIsNarrow } from './use-is-narrow.ts';

interface RevisionHistoryProps {
  team: string;
  table: TaggedTable;
  /** Number of the revision in sight. */
  shown: number;
}

/** Every revision, newest first: what was said of it, by whom, when, and what it measures. */
export function RevisionHistory({ team, table, shown }: RevisionHistoryProps) {
  const { data, error, refetch, hasNextPage, fetchNextPage, isFetchingNextPage } = useInfiniteQuery(
    tableQueries.revisions(team, table.slug),
  );
  const isNarrow = useIsNarrow();
  const revisions = data?.pages.flatMap(({ items }) => items);
  const List = isNarrow ? Cards : Rows;
  return (
    <Panel title="Revisions">
      <ProblemNotice fault={error && asProblem(error)} onTryAgain={() => void refetch()} />
      {revisions === undefined && !error && <Waiting>Reading the revisions…</Waiting>}
      {revisions !== undefined && (
        <>
          <List team={team} table={table.slug} revisions={revisions} shown={shown} />
          <div className="pager">
            <span className="quiet">
              {revisions.length} of {table.latestRevision.toLocaleString('en')} shown. A revision never
              changes; a table takes {table.revisionsAtMost.toLocaleString('en')} of them.
            </span>
            {hasNextPage && (
              <Button size="small" isDisabled={isFetchingNextPage} onPress={() => void fetchNextPage()}>
                Older ones
              </Button>
            )}
          </div>
        </>
      )}
    </Panel>
  );
}

interface ListProps {
  team: string;
  table: string;
  revisions: readonly RevisionSummary[];
  shown: number;
}

function Rows({ team, table, revisions, shown }: ListProps) {
  return (
    <table className="ledger">
      <caption className="sr-only">Revisions, newest first</caption>
      <thead>
        <tr>
          <th scope="col">Revision</th>
          <th scope="col">Note</th>
          <th scope="col">State</th>
          <th scope="col" className="is-number">
            Size
          </th>
          <th scope="col" className="is-number">
            SNR
          </th>
          <th scope="col" className="is-number">
            Bytes
          </th>
          <th scope="col">Made</th>
          <th scope="col">
            <span className="sr-only">Actions</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {revisions.map((revision) => (
          <tr key={revision.number} aria-current={revision.number === shown}>
            <td>
              <NumberLink team={team} table={table} number={revision.number} />
            </td>
            <td>
              <Note note={revision.note} />
            </td>
            <td>
              <StateWord state={revision.state} />
            </td>
            <td className="is-number">{saySize(revision)}</td>
            <td className="is-number">{saySnr(revision.snrDb)}</td>
            <td className="is-number">{sayBytes(revision.tableBytes)}</td>
            <td className="library-who">
              <Moment at={revision.madeAt} />
              <span className="quiet">{revision.madeBy.name}</span>
            </td>
            <td>
              <span className="revision-actions">
                <Compare team={team} table={table} number={revision.number} shown={shown} />
                <OpenOnBench team={team} table={table} number={revision.number} />
              </span>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function Cards({ team, table, revisions, shown }: ListProps) {
  return (
    <ul className="revision-cards" aria-label="Revisions, newest first">
      {revisions.map((revision) => (
        <li key={revision.number} aria-current={revision.number === shown}>
          <div className="library-card-head">
            <NumberLink team={team} table={table} number={revision.number} />
            <StateWord state={revision.state} />
            <OpenOnBench team={team} table={table} number={revision.number} />
          </div>
          <p className="library-card-figures">
            <span>{saySize(revision)}</span>
            <span>SNR {saySnr(revision.snrDb)}</span>
            <span>{sayBytes(revision.tableBytes)}</span>
          </p>
          <Note note={revision.note} />
          <p className="quiet">
            <Moment at={revision.madeAt} />, {revision.madeBy.name}
          </p>
          <p>
            <Compare team={team} table={table} number={revision.number} shown={shown} />
          </p>
        </li>
      ))}
    </ul>
  );
}

function NumberLink({ team, table, number }: { team: string; table: string; number: number }) {
  return (
    <Link
      to={tablePath(team, table, number)}
      className="library-link"
      aria-label={`Revision ${number}`}
      preventScrollReset
    >
      {number}
    </Link>
  );
}

function Note({ note }: { note: string }) {
  return note === '' ? <span className="quiet">no note</span> : <p className="revision-note">{note}</p>;
}

interface CompareProps {
  team: string;
  table: string;
  number: number;
  shown: number;
}

/** Side by side with the revision in sight, the earlier one first. */
function Compare({ team, table, number, shown }: CompareProps) {
  if (number === shown) return null;
  const [first, second] = [Math.min(number, shown), Math.max(number, shown)];
  return (
    <Link
      to={comparePath(team, revisionText(table, first), revisionText(table, second))}
      className="button button-plain button-small"
      aria-label={`Compare revision ${number} with revision ${shown}`}
    >
      Compare
    </Link>
  );
}

function OpenOnBench({ team, table, number }: { team: string; table: string; number: number }) {
  return (
    <Link
      to={openRevisionPath(team, table, number)}
      className="button button-plain button-small"
      aria-label={`Open revision ${number} on the bench`}
    >
      To the bench
    </Link>
  );
}
