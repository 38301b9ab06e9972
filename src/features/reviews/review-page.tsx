import './reviews.css';
import { useQuery, useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import { useMemo, type ComponentType } from 'react';
import { Link, useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { includesRole, type Revision } from '../../../shared/contract/index.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { asProblem } from '../../api/problem-error.ts';
import { reviewQueries, type RevisionAt, type TaggedReview } from '../../api/reviews.ts';
import { tableQueries } from '../../api/tables.ts';
import { teamQueries } from '../../api/teams.ts';
import { Moment, Page, Panel, Waiting } from '../../components/index.ts';
import { StateWord } from '../../components/state-word.tsx';
import { load } from '../../forms/load.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import {
  comparePath,
  openRevisionPath,
  revisionText,
  reviewsPath,
  tablePath,
  teamPath,
} from '../../paths.ts';
import { changedSettings, listSettings } from '../../settings/index.ts';
import { CommentProvider } from './comment-context.ts';
import { CommentsPanel } from './comments-panel.tsx';
import { CompareView } from './compare/compare-view.tsx';
import type { FiguresOf } from './compare/figures-part.tsx';
import { SettingRows } from './compare/setting-rows.tsx';
import { DecisionPanel } from './decision-panel.tsx';
import { SubmissionPanel } from './submission-panel.tsx';

const placeOf = ({ team = '', table = '', number = '' }: Record<string, string | undefined>): RevisionAt => ({
  team,
  table,
  number: Number(number),
});

export const reviewLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const at = placeOf(args.params);
  const [{ lastVetted }] = await load(
    args,
    Promise.all([
      queryClient.query(reviewQueries.detail(at)),
      queryClient.query(teamQueries.detail(at.team)),
    ]),
  );
  for (const number of [at.number, lastVetted])
    if (number !== null)
      void queryClient.query(tableQueries.revision(at.team, at.table, number)).catch(() => undefined);
  void queryClient.query(reviewQueries.comments(at)).catch(() => undefined);
  chooseTeam(at.team);
  return null;
};

export interface ReviewPageProps {
  /** Drawings, figures and sound of one revision; they are the bench's own, as are the figures. */
  RevisionView: ComponentType<{ revision: Revision }>;
  figuresOf: FiguresOf;
}

/** A revision to be judged: what is asked, what has changed since the last vetted one, and the verdict. */
export function ReviewPage(props: ReviewPageProps) {
  const parameters = useParams();
  const { team, table, number } = placeOf(parameters);
  const at = useMemo(() => ({ team, table, number }), [team, table, number]);
  return <OneReview key={`${table} ${number}`} at={at} {...props} />;
}

function OneReview({ at, ...views }: { at: RevisionAt } & ReviewPageProps) {
  const { data: review } = useSuspenseQuery(reviewQueries.detail(at));
  const { data: team } = useSuspenseQuery(teamQueries.detail(at.team));
  const { data: comments = [] } = useQuery(reviewQueries.comments(at));
  const settings = useSettingsInSight(at, review.lastVetted);
  const commenting = useMemo(
    () => ({ at, comments, mayWrite: includesRole(team.myRole, 'author') }),
    [at, comments, team.myRole],
  );
  return (
    <Page
      title={`Review of ${review.tableTitle}, revision ${at.number}`}
      size="wide"
      trail={
        <>
          <Link to={teamPath(at.team)}>{team.name}</Link>
          <span aria-hidden="true">/</span>
          <Link to={reviewsPath(at.team)}>Reviews</Link>
          <span aria-hidden="true">/</span>
          <Link to={tablePath(at.team, at.table, at.number)}>{review.tableTitle}</Link>
        </>
      }
      lead={
        <p className="flex flex-wrap items-center gap-x-3">
          <StateWord state={review.state} />
          <span>
            Made by {review.madeBy.name} <Moment at={review.madeAt} />
          </span>
        </p>
      }
      actions={
        <>
          <Link
            to={comparePath(at.team, undefined, revisionText(at.table, at.number))}
            className="button button-plain"
          >
            Compare with another
          </Link>
          <Link to={openRevisionPath(at.team, at.table, at.number)} className="button button-plain">
            Open on the bench
          </Link>
        </>
      }
    >
      <CommentProvider value={commenting}>
        <div className="review-parts">
          <div className="review-asked">
            <SubmissionPanel at={at} review={review} />
          </div>
          <div className="review-changes">
            <Changes at={at} review={review} {...views} />
          </div>
          <div className="review-verdict">
            <DecisionPanel at={at} review={review} />
            <CommentsPanel shownElsewhere={settings} />
          </div>
        </div>
      </CommentProvider>
    </Page>
  );
}

/** Paths of the settings that the page shows, whose comments stand beside them. */
function useSettingsInSight({ team, table, number }: RevisionAt, lastVetted: number | null): Set<string> {
  const { data: revision } = useQuery(tableQueries.revision(team, table, number));
  const { data: before } = useQuery({
    ...tableQueries.revision(team, table, lastVetted ?? 0),
    enabled: lastVetted !== null,
  });
  return useMemo(() => {
    if (revision === undefined) return new Set<string>();
    if (lastVetted === null) return new Set(listSettings(revision.definition).map(({ path }) => path));
    if (before === undefined) return new Set<string>();
    return new Set(changedSettings(before.definition, revision.definition).map(({ path }) => path));
  }, [revision, before, lastVetted]);
}

function Changes({
  at,
  review: { lastVetted, tableTitle: title },
  RevisionView,
  figuresOf,
}: { at: RevisionAt; review: TaggedReview } & ReviewPageProps) {
  if (lastVetted === null) return <Alone at={at} RevisionView={RevisionView} />;
  return (
    <section className="space-y-3" aria-labelledby="changes-title">
      <h2 id="changes-title">What has changed since revision {lastVetted}, the last vetted one</h2>
      <CompareView a={{ ...at, number: lastVetted, title }} b={{ ...at, title }} figuresOf={figuresOf} />
    </section>
  );
}

/** A revision that has no vetted one before it. */
function Alone({ at, RevisionView }: { at: RevisionAt; RevisionView: ReviewPageProps['RevisionView'] }) {
  const { data: revision, error, refetch } = useQuery(tableQueries.revision(at.team, at.table, at.number));
  if (error) return <ProblemNotice fault={asProblem(error)} onTryAgain={() => void refetch()} />;
  if (revision === undefined) return <Waiting>Reading revision {at.number}…</Waiting>;
  return (
    <section className="space-y-3" aria-labelledby="changes-title">
      <h2 id="changes-title">Revision {at.number}, with no vetted one before it</h2>
      <RevisionView revision={revision} />
      <Panel title="How it is set">
        <SettingRows
          caption={`Settings of revision ${at.number}`}
          heads={['Value']}
          settings={listSettings(revision.definition).map(({ path, name, value }) => ({
            path,
            name,
            values: [value],
          }))}
        />
      </Panel>
    </section>
  );
}
