import { useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { revisionStates } from '../../../shared/contract/index.ts';
import { ProblemError } from '../../api/problem-error.ts';
import { tableQueries, type ListQuery } from '../../api/tables.ts';
import { Button, ChoiceField, SelectField, TextField } from '../../components/index.ts';
import { changedQuery, isFiltered, isSort, sortedBy, unfiltered, viewOf } from './list-query.ts';
import type { ChangeQuery } from './use-list-query.ts';
import { sortWords } from './sort-words.ts';
import { stateLooks } from '../../components/state-word.tsx';
import { useIsNarrow } from './use-is-narrow.ts';

interface FiltersProps {
  team: string;
  query: ListQuery;
  onChange: ChangeQuery;
}

/** A typed search goes into the address once it rests, in milliseconds. */
const restMs = 250;

/** What the list is narrowed by. All of it stands in the address. */
export function Filters({ team, query, onChange }: FiltersProps) {
  const view = viewOf(query);
  const { data: tags = [] } = useQuery(tableQueries.tags(team));
  const isNarrow = useIsNarrow();
  const set = (part: Record<string, string | undefined>) => onChange((before) => changedQuery(before, part));
  const known = tags.map(({ tag, tables }) => ({ value: tag, label: `${tag} (${tables})` }));
  const tagOptions =
    view.tag === undefined || tags.some(({ tag }) => tag === view.tag)
      ? known
      : [...known, { value: view.tag, label: view.tag }];
  return (
    <search className="filters" aria-label="Tables">
      <SearchField {...{ team, query, onChange }} />
      <SelectField
        label="Tag"
        value={view.tag ?? ''}
        options={[{ value: '', label: 'any' }, ...tagOptions]}
        onChange={(tag) => set({ tag })}
      />
      <SelectField
        label="State"
        value={view.state ?? ''}
        options={[
          { value: '', label: 'any' },
          ...revisionStates.map((state) => ({ value: state, label: stateLooks[state].words })),
        ]}
        onChange={(state) => set({ state })}
      />
      <ChoiceField
        label="Kept in"
        value={view.isArchived ? 'yes' : 'no'}
        options={[
          { value: 'no', label: 'Library' },
          { value: 'yes', label: 'Archive' },
        ]}
        onChange={(archived) => set({ archived })}
      />
      {isNarrow && (
        <SelectField
          label="Sorted by"
          value={view.sort}
          options={Object.entries(sortWords).map(([value, label]) => ({ value, label }))}
          onChange={(sort) => isSort(sort) && onChange((before) => sortedBy(before, sort))}
        />
      )}
      {isFiltered(query) && (
        <Button variant="quiet" onPress={() => onChange(unfiltered)}>
          Clear the filters
        </Button>
      )}
    </search>
  );
}

function SearchField({ team, query, onChange }: FiltersProps) {
  const kept = viewOf(query).search;
  const [typed, setTyped] = useState({ text: kept, over: kept });
  // An address from elsewhere (back, a cleared filter) shows as itself.
  const isOwn = kept === typed.over || kept === typed.text.trim();
  if (!isOwn) setTyped({ text: kept, over: kept });
  const { error } = useQuery(tableQueries.list(team, query));
  const problem = error instanceof ProblemError ? error.at('search') : undefined;

  useEffect(() => {
    const text = typed.text.trim();
    if (text === kept) return;
    const timer = setTimeout(() => {
      setTyped((before) => ({ ...before, over: text }));
      onChange((before) => changedQuery(before, { search: text }), { replace: true });
    }, restMs);
    return () => clearTimeout(timer);
    // A new address brings new functions; only what was typed is to start the clock.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [typed.text, kept]);

  return (
    <TextField
      label="Search"
      type="search"
      placeholder="words of name or tags"
      autoComplete="off"
      value={typed.text}
      onChange={(text) => setTyped({ ...typed, text })}
      problem={problem && `${problem.value} is not allowed. Allowed: ${problem.allowed}.`}
    />
  );
}
