import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { asProblem } from '../api/problem-error.ts';
import { tableQueries } from '../api/tables.ts';
import { NumberField, SelectField, TextField } from '../components/index.ts';
import { StateWord } from '../components/state-word.tsx';
import { useSettled } from '../components/use-settled.ts';
import { tablePath } from '../paths.ts';

/** One revision of a table of a team's library. */
export interface PickedRevision {
  /** The table's slug. */
  readonly table: string;
  readonly number: number;
}

interface RevisionFieldsProps {
  team: string;
  picked: PickedRevision | null;
  onPick: (next: PickedRevision) => void;
}

/** Typing rests so long before tables are looked for, in milliseconds. */
const restMs = 250;
const mostFound = '30';

/** Chooses a table of the library and one of its revisions. */
export function RevisionFields({ team, picked, onPick }: RevisionFieldsProps) {
  return (
    <>
      <TableChoice team={team} picked={picked} onPick={onPick} />
      {picked !== null && <RevisionChoice team={team} picked={picked} onPick={onPick} />}
    </>
  );
}

function TableChoice({ team, picked, onPick }: RevisionFieldsProps) {
  const [typed, setTyped] = useState('');
  const search = useSettled(typed.trim(), restMs);
  const { data, error } = useQuery(
    tableQueries.list(team, { limit: mostFound, sort: 'changed', ...(search !== '' && { search }) }),
  );
  const { data: chosen } = useQuery({
    ...tableQueries.detail(team, picked?.table ?? ''),
    enabled: picked !== null,
  });
  const found = data?.items ?? [];
  const known = found.map(({ slug, title }) => ({ value: slug, label: title }));
  const isListed = picked === null || found.some(({ slug }) => slug === picked.table);
  const own =
    isListed || picked === null ? [] : [{ value: picked.table, label: chosen?.title ?? picked.table }];
  const nothing =
    picked === null ? [{ value: '', label: found.length === 0 ? 'none found' : 'choose one' }] : [];
  return (
    <div className="field-pair">
      <TextField
        label="Find a table"
        type="search"
        autoComplete="off"
        placeholder="words of name or tags"
        value={typed}
        onChange={setTyped}
        problem={error ? asProblem(error).message : undefined}
      />
      <SelectField
        label="Table"
        value={picked?.table ?? ''}
        options={[...nothing, ...own, ...known]}
        onChange={(slug) => {
          const table = found.find((one) => one.slug === slug);
          if (table !== undefined) onPick({ table: slug, number: table.latestRevision });
        }}
        description={
          data !== undefined && data.nextCursor !== null
            ? `The ${mostFound} that changed last; type words to find others.`
            : undefined
        }
      />
    </div>
  );
}

function RevisionChoice({ team, picked, onPick }: RevisionFieldsProps & { picked: PickedRevision }) {
  const { data: table } = useQuery(tableQueries.detail(team, picked.table));
  const { data: revision } = useQuery(tableQueries.revision(team, picked.table, picked.number));
  const newest = table?.latestRevision ?? picked.number;
  return (
    <div className="field-pair">
      <NumberField
        label="Revision"
        unit=""
        isInteger
        min={1}
        max={newest}
        allowed={`a whole number from 1 to ${newest}`}
        value={picked.number}
        onChange={(number) => onPick({ ...picked, number })}
        description={table && `The newest is ${newest}.`}
      />
      {revision !== undefined && (
        <p className="picked-facts">
          <StateWord state={revision.state} />
          <span className="quiet">
            {revision.length.toLocaleString('en')} × {revision.bits} bits, {revision.madeBy.name}
          </span>
          <Link to={tablePath(team, picked.table, picked.number)} className="link">
            Its page
          </Link>
        </p>
      )}
    </div>
  );
}
