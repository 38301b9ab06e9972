import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import { newKey } from '../../api/new-key.ts';
import { createTable, tableQueries, type ListQuery } from '../../api/tables.ts';
import { Button, EmptyState } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { paths, tablePath } from '../../paths.ts';
import { workingExample } from './example.ts';
import { changedQuery, isFiltered, unfiltered } from './list-query.ts';
import type { ChangeQuery } from './use-list-query.ts';

interface NoTablesProps {
  team: string;
  query: ListQuery;
  mayEdit: boolean;
  onChange: ChangeQuery;
}

/** An empty list: by its filters, behind its last page, or because nothing has been saved yet. */
export function NoTables({ team, query, mayEdit, onChange }: NoTablesProps) {
  if (query.cursor !== undefined) {
    return (
      <EmptyState
        title="Nothing more on this page"
        actions={<Button onPress={() => onChange((before) => changedQuery(before, {}))}>First page</Button>}
      >
        <p>What stood here has moved or gone meanwhile.</p>
      </EmptyState>
    );
  }
  if (isFiltered(query)) {
    return (
      <EmptyState
        title={
          query.archived === 'yes' ? 'Nothing in the archive that fits' : 'No table passes these filters'
        }
        actions={<Button onPress={() => onChange(unfiltered)}>Clear the filters</Button>}
      >
        <p>The search looks for beginnings of words in names and tags; case and accents do not count.</p>
      </EmptyState>
    );
  }
  return mayEdit ? <FirstTable team={team} /> : <NothingYet />;
}

function NothingYet() {
  return (
    <EmptyState title="Nothing has been saved yet">
      <p>Tables appear here once an author of the team saves one from the bench.</p>
    </EmptyState>
  );
}

function FirstTable({ team }: { team: string }) {
  const [key] = useState(newKey);
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const adding = useSubmit(async () => {
    const made = await createTable(team, workingExample(), key);
    await queryClient.invalidateQueries({ queryKey: tableQueries.all(team) });
    await navigate(tablePath(team, made.slug));
  });
  return (
    <EmptyState
      title="Nothing has been saved yet"
      actions={
        <>
          <Link to={paths.bench} className="button button-primary">
            Shape a wave on the bench
          </Link>
          <Link to={paths.bringIn} className="button button-plain">
            Bring in what exists
          </Link>
          <Button isDisabled={adding.isBusy} onPress={() => void adding.submit(undefined)}>
            Add one working example
          </Button>
        </>
      }
    >
      <p>
        Shape a wave on the bench and press Save there: it becomes revision 1 of a table here. The example is
        a sine for checking an output.
      </p>
      <ProblemNotice fault={adding.fault} />
    </EmptyState>
  );
}
