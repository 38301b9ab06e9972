import './tables.css';
import { useQuery, useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import type { ComponentType } from 'react';
import { Link, useParams, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { includesRole, type Revision } from '../../../shared/contract/index.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { asProblem } from '../../api/problem-error.ts';
import type { RevisionAt } from '../../api/reviews.ts';
import { tableQueries, type TaggedTable } from '../../api/tables.ts';
import { teamQueries } from '../../api/teams.ts';
import { Moment, Page, Waiting } from '../../components/index.ts';
import { load } from '../../forms/load.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { openRevisionPath, tablesPath, teamPath } from '../../paths.ts';
import { ExportSection } from './export-section.tsx';
import { OriginalsSection } from './originals-section.tsx';
import { RevisionHistory } from './revision-history.tsx';
import { StateWord } from '../../components/state-word.tsx';
import { TableActions } from './table-actions.tsx';

export interface TablePageProps {
  /** Drawings, figures and sound of a revision; they are the bench's own. */
  RevisionView: ComponentType<{ revision: Revision }>;
  /** How a revision stands in review, and what can be done about it. */
  RevisionReview: ComponentType<{ at: RevisionAt }>;
}

const shownNumber = (parameters: URLSearchParams, newest: number): number => {
  const asked = Number(parameters.get('revision'));
  return Number.isInteger(asked) && asked >= 1 && asked <= newest ? asked : newest;
};

export const tableLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const { team = '', table = '' } = args.params;
  const [{ latestRevision }] = await load(
    args,
    Promise.all([
      queryClient.query(tableQueries.detail(team, table)),
      queryClient.query(teamQueries.detail(team)),
    ]),
  );
  const number = shownNumber(new URL(args.request.url).searchParams, latestRevision);
  void queryClient.query(tableQueries.revision(team, table, number)).catch(() => undefined);
  void queryClient.infiniteQuery(tableQueries.revisions(team, table)).catch(() => undefined);
  chooseTeam(team);
  return null;
};

/** One table: a revision of it to see, hear and export, and all the others. */
export function TablePage({ RevisionView, RevisionReview }: TablePageProps) {
  const { team: teamSlug = '', table: slug = '' } = useParams();
  const { data: table } = useSuspenseQuery(tableQueries.detail(teamSlug, slug));
  const { data: team } = useSuspenseQuery(teamQueries.detail(teamSlug));
  const [parameters] = useSearchParams();
  const number = shownNumber(parameters, table.latestRevision);
  const mayEdit = includesRole(team.myRole, 'author');
  return (
    <Page
      title={table.title}
      size="wide"
      trail={
        <>
          <Link to={teamPath(teamSlug)}>{team.name}</Link>
          <span aria-hidden="true">/</span>
          <Link to={tablesPath(teamSlug)}>Tables</Link>
        </>
      }
      lead={<Facts team={teamSlug} table={table} mayEdit={mayEdit} />}
      actions={
        <>
          <Link to={openRevisionPath(teamSlug, slug, number)} className="button button-primary">
            Open on the bench
          </Link>
          {mayEdit && <TableActions team={teamSlug} table={table} number={number} />}
        </>
      }
    >
      <div className="table-parts">
        <Shown
          {...{ teamSlug, slug, number, RevisionView, RevisionReview }}
          newest={table.latestRevision}
          isAdmin={includesRole(team.myRole, 'admin')}
        />
        <ExportSection key={number} team={teamSlug} table={slug} number={number} defaults={team.defaults} />
        <RevisionHistory team={teamSlug} table={table} shown={number} />
      </div>
    </Page>
  );
}

function Facts({ team, table, mayEdit }: { team: string; table: TaggedTable; mayEdit: boolean }) {
  return (
    <div className="space-y-1">
      <p className="flex flex-wrap items-center gap-x-3">
        <StateWord state={table.state} />
        {table.isArchived && <strong>Archived</strong>}
        <span>
          Newest revision: {table.latestRevision}. Changed <Moment at={table.changedAt} /> by{' '}
          {table.changedBy.name}
        </span>
      </p>
      {table.tags.length > 0 && (
        <ul className="tag-list" aria-label="Tags">
          {table.tags.map((tag) => (
            <li key={tag}>
              <Link
                className="tag"
                to={tablesPath(team, String(new URLSearchParams({ tag })))}
                aria-label={`Tables tagged ${tag}`}
              >
                {tag}
              </Link>
            </li>
          ))}
        </ul>
      )}
      {!mayEdit && (
        <p>
          As a viewer you read, listen and export. Saving revisions, renaming and archiving take the role
          author.
        </p>
      )}
    </div>
  );
}

interface ShownProps extends TablePageProps {
  teamSlug: string;
  slug: string;
  number: number;
  newest: number;
  isAdmin: boolean;
}

function Shown({ teamSlug, slug, number, newest, isAdmin, RevisionView, RevisionReview }: ShownProps) {
  const { data: revision, error, refetch } = useQuery(tableQueries.revision(teamSlug, slug, number));
  return (
    <section className="space-y-3" aria-labelledby="shown-revision">
      <h2 id="shown-revision">
        Revision {number}
        {number === newest ? ', the newest' : ` of ${newest}`}
      </h2>
      <RevisionReview key={`${slug} ${number}`} at={{ team: teamSlug, table: slug, number }} />
      <ProblemNotice fault={error && asProblem(error)} onTryAgain={() => void refetch()} />
      {revision === undefined && !error && <Waiting>Reading revision {number}…</Waiting>}
      {revision !== undefined && (
        <>
          {revision.note !== '' && <p className="revision-note">{revision.note}</p>}
          <RevisionView key={`${slug} ${number}`} revision={revision} />
          <OriginalsSection at={{ team: teamSlug, table: slug, number }} mayRemove={isAdmin} />
          <details className="quiet">
            <summary>Digest and engine</summary>
            <dl className="facts">
              <div>
                <dt>SHA-256</dt>
                <dd>
                  <code>{revision.digest}</code>
                </dd>
              </div>
              <div>
                <dt>Engine</dt>
                <dd>{revision.engineVersion}</dd>
              </div>
            </dl>
          </details>
        </>
      )}
    </section>
  );
}
