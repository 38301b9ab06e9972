import './tables.css';
import { useQuery, useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import { useRef, type RefObject } from 'react';
import { Link, useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { includesRole } from '../../../shared/contract/index.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { asProblem, ProblemError } from '../../api/problem-error.ts';
import { tableQueries, type ListQuery } from '../../api/tables.ts';
import { teamQueries } from '../../api/teams.ts';
import { Page, Waiting, useKeyGroup, useSingleKeys, type KeyGroup } from '../../components/index.ts';
import { load } from '../../forms/load.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { comparePath, paths, teamPath } from '../../paths.ts';
import { Filters } from './filters.tsx';
import { readListQuery, viewOf } from './list-query.ts';
import { NoTables } from './no-tables.tsx';
import { Pager } from './pager.tsx';
import { PlayingBar } from './play-button.tsx';
import { useRowPlayer } from './row-player.ts';
import { TablesList } from './tables-list.tsx';
import { useListQuery, type ChangeQuery } from './use-list-query.ts';

export const tablesLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const team = args.params.team ?? '';
  const query = readListQuery(new URL(args.request.url).searchParams);
  // What is wrong with a filter stands beside the filters; nothing of them is to go away for it.
  const list = queryClient.query(tableQueries.list(team, query)).catch((error: unknown) => {
    if (error instanceof ProblemError && error.status === 401) throw error;
  });
  void queryClient.query(tableQueries.tags(team)).catch(() => undefined);
  await load(args, Promise.all([queryClient.query(teamQueries.detail(team)), list]));
  chooseTeam(team);
  return null;
};

const listKeys: KeyGroup = {
  title: 'Tables',
  keys: [
    { caps: ['/'], does: 'Go to the search', isSingle: true },
    { caps: ['↑', '↓'], does: 'On a table: go to the one above or below' },
  ],
};

/** The library of a team. */
export function TablesPage() {
  const { team = '' } = useParams();
  return <Library key={team} team={team} />;
}

function Library({ team: slug }: { team: string }) {
  const { data: team } = useSuspenseQuery(teamQueries.detail(slug));
  const { query, wanted, change } = useListQuery();
  const page = useRef<HTMLDivElement>(null);
  const mayEdit = includesRole(team.myRole, 'author');
  useKeyGroup(listKeys);
  useSearchKey(page);

  return (
    <Page
      title="Tables"
      size="wide"
      trail={<Link to={teamPath(slug)}>{team.name}</Link>}
      lead={
        mayEdit ? undefined : (
          <p>As a viewer you read, listen and export. Saving and changing takes the role author.</p>
        )
      }
      actions={
        <>
          <Link to={comparePath(slug)} className="button button-plain">
            Compare two
          </Link>
          {mayEdit && (
            <Link to={paths.bench} className="button button-plain">
              Go to the bench
            </Link>
          )}
        </>
      }
    >
      <div ref={page} className="library">
        <Filters team={slug} query={wanted} onChange={change} />
        <Found team={slug} query={query} mayEdit={mayEdit} onChange={change} />
      </div>
    </Page>
  );
}

interface FoundProps {
  team: string;
  query: ListQuery;
  mayEdit: boolean;
  onChange: ChangeQuery;
}

function Found({ team, query, mayEdit, onChange }: FoundProps) {
  const { data, error, refetch, isPlaceholderData } = useQuery(tableQueries.list(team, query));
  const player = useRowPlayer(team);
  const problem = error && asProblem(error);
  if (problem !== null)
    return <ProblemNotice fault={problem} shownElsewhere={['search']} onTryAgain={() => void refetch()} />;
  if (data === undefined) return <Waiting>Reading the tables…</Waiting>;
  if (data.items.length === 0) return <NoTables {...{ team, query, mayEdit, onChange }} />;
  return (
    <>
      <p className="quiet">
        Play starts quietly. Take headphones off, or turn the device down, before you press it.
      </p>
      <div aria-busy={isPlaceholderData} className="found">
        <TablesList
          {...{ team, query, player, onChange }}
          tables={data.items}
          isArchived={viewOf(query).isArchived}
        />
      </div>
      <Pager query={query} count={data.items.length} nextCursor={data.nextCursor} />
      <PlayingBar player={player} />
    </>
  );
}

/** `/` goes to the search. */
function useSearchKey(page: RefObject<HTMLDivElement | null>) {
  useSingleKeys((key) => {
    const search = page.current?.querySelector<HTMLInputElement>('input[type=search]');
    if (key !== '/' || !search) return false;
    search.select();
    search.focus();
    return true;
  });
}
