import type { KeyboardEvent } from 'react';
import { Link } from 'react-router-dom';
import type { TableSummary } from '../../../shared/contract/index.ts';
import type { ListQuery } from '../../api/tables.ts';
import { Moment } from '../../components/index.ts';
import { StairDrawing } from '../../plots/index.ts';
import { tablePath, tablesPath } from '../../paths.ts';
import { changedQuery, type Sort } from './list-query.ts';
import { PlayButton } from './play-button.tsx';
import type { RowPlayer } from './row-player.ts';
import { sayBytes, saySize, saySnr } from './say-figures.ts';
import { SortHead } from './sort-head.tsx';
import { StateWord } from '../../components/state-word.tsx';
import { useIsNarrow } from './use-is-narrow.ts';
import type { ChangeQuery } from './use-list-query.ts';

interface TablesListProps {
  team: string;
  tables: readonly TableSummary[];
  isArchived: boolean;
  query: ListQuery;
  player: RowPlayer;
  onChange: ChangeQuery;
}

/** The tables that were found: rows, or cards where there is no room for rows. */
export function TablesList(props: TablesListProps) {
  const isNarrow = useIsNarrow();
  const label = props.isArchived ? 'Archived tables' : 'Tables of the library';
  return (
    <div onKeyDown={walk}>
      {isNarrow ? <Cards {...props} label={label} /> : <Rows {...props} label={label} />}
    </div>
  );
}

function Rows({ team, tables, query, player, onChange, label }: TablesListProps & { label: string }) {
  const head = (sort: Sort) => ({ sort, query, onChange });
  return (
    <table className="ledger library-rows">
      <caption className="sr-only">{label}</caption>
      <thead>
        <tr>
          <th scope="col">
            <span className="sr-only">Listen</span>
          </th>
          <th scope="col">Staircase</th>
          <SortHead {...head('title')} />
          <SortHead {...head('length')} isNumber />
          <SortHead {...head('bits')} isNumber />
          <SortHead {...head('snr')} isNumber />
          <SortHead {...head('bytes')} isNumber />
          <th scope="col">State</th>
          <SortHead {...head('changed')} />
        </tr>
      </thead>
      <tbody>
        {tables.map((table) => (
          <tr key={table.slug}>
            <td>
              <PlayButton player={player} table={table} />
            </td>
            <td>
              <Stairs table={table} />
            </td>
            <td>
              <Name team={team} table={table} />
              <Tags team={team} query={query} tags={table.tags} />
              <Trouble player={player} table={table} />
            </td>
            <td className="is-number">{table.length.toLocaleString('en')}</td>
            <td className="is-number">{table.bits}</td>
            <td className="is-number">{saySnr(table.snrDb)}</td>
            <td className="is-number">{sayBytes(table.tableBytes)}</td>
            <td>
              <StateWord state={table.state} />
            </td>
            <td className="library-who">
              <Moment at={table.changedAt} />
              <span className="quiet">{table.changedBy.name}</span>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function Cards({ team, tables, query, player, label }: TablesListProps & { label: string }) {
  return (
    <ul className="library-cards" aria-label={label}>
      {tables.map((table) => (
        <li key={table.slug} className="library-card">
          <div className="library-card-head">
            <PlayButton player={player} table={table} />
            <Name team={team} table={table} />
            <StateWord state={table.state} />
          </div>
          <Stairs table={table} />
          <p className="library-card-figures">
            <span>{saySize(table)}</span>
            <span>SNR {saySnr(table.snrDb)}</span>
            <span>{sayBytes(table.tableBytes)}</span>
          </p>
          <Tags team={team} query={query} tags={table.tags} />
          <p className="quiet">
            <Moment at={table.changedAt} />, {table.changedBy.name}
          </p>
          <Trouble player={player} table={table} />
        </li>
      ))}
    </ul>
  );
}

function Name({ team, table: { slug, title, latestRevision } }: { team: string; table: TableSummary }) {
  return (
    <span className="library-name">
      <Link to={tablePath(team, slug)} className="library-link" data-row>
        {title}
      </Link>{' '}
      <span className="quiet">rev. {latestRevision}</span>
    </span>
  );
}

function Tags({ team, query, tags }: { team: string; query: ListQuery; tags: readonly string[] }) {
  if (tags.length === 0) return null;
  return (
    <ul className="tag-list" aria-label="Tags">
      {tags.map((tag) => (
        <li key={tag}>
          <Link
            className="tag"
            to={tablesPath(team, String(new URLSearchParams(changedQuery(query, { tag }))))}
            aria-label={`Tables tagged ${tag}`}
          >
            {tag}
          </Link>
        </li>
      ))}
    </ul>
  );
}

/** Shares of full scale are drawn as codes of eight bits. */
function Stairs({ table: { title, drawing } }: { table: TableSummary }) {
  return <StairDrawing codes={drawing.high} low={drawing.low} bits={8} label={`Staircase of ${title}`} />;
}

function Trouble({ player, table }: { player: RowPlayer; table: TableSummary }) {
  if (player.trouble?.of.slug !== table.slug) return null;
  return (
    <p role="alert" className="library-trouble">
      {player.trouble.words}
    </p>
  );
}

/** Arrows go from table to table. */
function walk(event: KeyboardEvent<HTMLElement>) {
  const step = { ArrowDown: 1, ArrowUp: -1 }[event.key];
  if (step === undefined || !(event.target as Element).matches('[data-row]')) return;
  const links = [...event.currentTarget.querySelectorAll<HTMLElement>('[data-row]')];
  const goal = links[links.indexOf(event.target as HTMLElement) + step];
  if (!goal) return;
  event.preventDefault();
  goal.focus();
}
