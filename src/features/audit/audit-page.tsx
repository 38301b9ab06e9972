import './audit.css';
import { useQuery, useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import { Link, useLocation, useParams, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { auditFile, auditQueries, type AuditAsk } from '../../api/audit.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { asProblem, ProblemError } from '../../api/problem-error.ts';
import { teamQueries } from '../../api/teams.ts';
import { Explain, Page, Waiting } from '../../components/index.ts';
import { load } from '../../forms/load.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { teamPath } from '../../paths.ts';
import { AuditFilters } from './audit-filters.tsx';
import { AuditList } from './audit-list.tsx';
import { changedQuery, isFiltered, readAuditQuery } from './audit-query.ts';

export const auditLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const team = args.params.team ?? '';
  const query = readAuditQuery(new URL(args.request.url).searchParams);
  // What is wrong with a filter stands beside the filters; nothing of them is to go away for it.
  const page = queryClient.query(auditQueries.page(team, query)).catch((error: unknown) => {
    if (error instanceof ProblemError && error.status === 422) return;
    throw error;
  });
  void queryClient.query(teamQueries.members(team)).catch(() => undefined);
  await load(args, Promise.all([queryClient.query(teamQueries.detail(team)), page]));
  chooseTeam(team);
  return null;
};

/** Who did what when, in a team. */
export function AuditPage() {
  const { team = '' } = useParams();
  return <Trail key={team} slug={team} />;
}

function Trail({ slug }: { slug: string }) {
  const { data: team } = useSuspenseQuery(teamQueries.detail(slug));
  const [parameters, setParameters] = useSearchParams();
  const query = readAuditQuery(parameters);
  return (
    <Page
      title="Audit trail"
      size="wide"
      trail={<Link to={teamPath(slug)}>{team.name}</Link>}
      lead={
        <p className="audit-lead">
          Who did what when, newest first. Days and times are UTC.
          <Explain title="the audit trail">
            <p>
              Every change of the team is noted together with the change itself: both happen, or neither. Each
              event is sealed (HMAC-SHA-256) over its own content and the seal before it, with a key that the
              database does not hold. Whoever looks after the server finds out with the command{' '}
              <code>audit-verify</code> whether an event was changed, removed, inserted or moved.
            </p>
          </Explain>
        </p>
      }
      actions={
        <a className="button button-plain" href={auditFile(slug, query)} download>
          {isFiltered(query) ? 'Download these as CSV' : 'Download all as CSV'}
        </a>
      }
    >
      <AuditFilters
        team={slug}
        query={query}
        onChange={(part) => setParameters(changedQuery(query, part), { preventScrollReset: true })}
        onClear={() => setParameters({}, { preventScrollReset: true })}
      />
      <Found team={slug} query={query} />
    </Page>
  );
}

function Found({ team, query }: { team: string; query: AuditAsk }) {
  const { data, error, refetch, isPlaceholderData } = useQuery(auditQueries.page(team, query));
  if (error) return <ProblemNotice fault={asProblem(error)} onTryAgain={() => void refetch()} />;
  if (data === undefined) return <Waiting>Reading the events…</Waiting>;
  return (
    <>
      {data.items.length === 0 ? (
        <p role="status">{query.cursor === undefined ? 'No event fits these filters.' : 'No older event.'}</p>
      ) : (
        <div aria-busy={isPlaceholderData} className="audit-found">
          <AuditList team={team} query={query} events={data.items} />
        </div>
      )}
      <Pages query={query} count={data.items.length} nextCursor={data.nextCursor} />
    </>
  );
}

interface PagesProps {
  query: AuditAsk;
  count: number;
  nextCursor: string | null;
}

/** Pages go from the newest back; the browser's own Back goes one forward again. */
function Pages({ query, count, nextCursor }: PagesProps) {
  const { pathname } = useLocation();
  const first = changedQuery(query, {});
  const to = (next: Record<string, string>) => ({ pathname, search: String(new URLSearchParams(next)) });
  return (
    <nav className="pager" aria-label="Pages">
      <span className="quiet">
        {count} {count === 1 ? 'event' : 'events'} on this page
        {query.cursor === undefined && nextCursor === null && ', all there are'}
      </span>
      {query.cursor !== undefined && (
        <Link to={to(first)} className="button button-plain button-small">
          Newest
        </Link>
      )}
      {nextCursor !== null && (
        <Link to={to({ ...first, cursor: nextCursor })} className="button button-plain button-small">
          Older
        </Link>
      )}
    </nav>
  );
}
