import type { QueryClient } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { useLoaderData, useNavigate, type LoaderFunctionArgs } from 'react-router-dom';
import { tableQueries } from '../../../api/tables.ts';
import { teamQueries } from '../../../api/teams.ts';
import { Waiting, useToast } from '../../../components/index.ts';
import { load } from '../../../forms/load.ts';
import { paths } from '../../../paths.ts';
import { theBench } from '../state/use-bench.ts';
import type { SavedLink } from './saved-links.ts';
import { theSavedLinks } from './use-saved-links.ts';

export const openRevisionLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const { team: slug = '', table: tableSlug = '', number = '' } = args.params;
  const [team, table, revision] = await load(
    args,
    Promise.all([
      queryClient.query(teamQueries.detail(slug)),
      // The next revision is made from the state that is there now.
      queryClient.query({ ...tableQueries.detail(slug, tableSlug), staleTime: 0 }),
      queryClient.query(tableQueries.revision(slug, tableSlug, Number(number))),
    ]),
  );
  const link: SavedLink = {
    team: slug,
    teamName: team.name,
    table: tableSlug,
    title: table.title,
    revision: revision.number,
    newest: table.latestRevision,
    etag: table.etag,
  };
  return { link, revision };
};

/** Puts a saved revision on the bench and goes there. */
export function OpenRevisionPage() {
  const { link, revision } = useLoaderData<Awaited<ReturnType<ReturnType<typeof openRevisionLoader>>>>();
  const navigate = useNavigate();
  const toast = useToast();
  const isOpened = useRef(false);
  useEffect(() => {
    if (isOpened.current) return;
    isOpened.current = true;
    const { definition, playback } = revision;
    theSavedLinks().open((work) => ({ ...work, definition, playback: playback ?? work.playback }), link);
    toast({
      message: `Revision ${link.revision} of ${link.title} is on the bench. What was there comes back with Undo.`,
      action: { label: 'Undo', onPress: () => theBench().undo() },
    });
    void navigate(paths.bench, { replace: true });
  }, [link, revision, navigate, toast]);
  return <Waiting>Putting the revision on the bench…</Waiting>;
}
