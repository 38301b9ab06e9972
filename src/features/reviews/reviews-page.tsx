import './reviews.css';
import { useInfiniteQuery, useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import { Link, useParams, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { includesRole, reviewShows, type Role } from '../../../shared/contract/index.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { asProblem } from '../../api/problem-error.ts';
import { reviewQueries, type ReviewShow } from '../../api/reviews.ts';
import { teamQueries } from '../../api/teams.ts';
import { Button, EmptyState, Page, TabPanel, TabRow, Waiting } from '../../components/index.ts';
import { load } from '../../forms/load.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { comparePath, tablesPath, teamPath } from '../../paths.ts';
import { ReviewRow } from './review-row.tsx';

const shownIn = (parameters: URLSearchParams): ReviewShow =>
  reviewShows.find((show) => show === parameters.get('show')) ?? 'for-me';

export const reviewsLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const team = args.params.team ?? '';
  const show = shownIn(new URL(args.request.url).searchParams);
  await load(
    args,
    Promise.all([
      queryClient.query(teamQueries.detail(team)),
      queryClient.infiniteQuery(reviewQueries.list(team, show)),
    ]),
  );
  chooseTeam(team);
  return null;
};

/** What waits to be judged, what one has submitted, and what was decided. */
export function ReviewsPage() {
  const { team = '' } = useParams();
  return <Reviews key={team} slug={team} />;
}

function Reviews({ slug }: { slug: string }) {
  const { data: team } = useSuspenseQuery(teamQueries.detail(slug));
  const [parameters, setParameters] = useSearchParams();
  const show = shownIn(parameters);
  return (
    <Page
      title="Reviews"
      trail={<Link to={teamPath(slug)}>{team.name}</Link>}
      lead={<p>A revision is submitted by its author and vetted or returned by a reviewer.</p>}
      actions={
        <Link to={comparePath(slug)} className="button button-plain">
          Compare two revisions
        </Link>
      }
    >
      <div className="space-y-4">
        <TabRow
          label="Which reviews"
          group="reviews"
          selected={show}
          tabs={[
            { id: 'for-me', label: <ForMe team={slug} /> },
            { id: 'waiting', label: 'Waiting' },
            { id: 'mine', label: 'Mine' },
            { id: 'decided', label: 'Decided' },
          ]}
          onSelect={(next) =>
            setParameters(next === 'for-me' ? {} : { show: next }, { preventScrollReset: true })
          }
        />
        <TabPanel id={show} group="reviews">
          <Found team={slug} show={show} role={team.myRole} />
        </TabPanel>
      </div>
    </Page>
  );
}

function ForMe({ team }: { team: string }) {
  const { data } = useInfiniteQuery(reviewQueries.list(team, 'for-me'));
  const count = data?.pages[0].waitingForMe ?? 0;
  return count === 0 ? 'For me' : `For me: ${count}`;
}

function Found({ team, show, role }: { team: string; show: ReviewShow; role: Role }) {
  const { data, error, refetch, hasNextPage, fetchNextPage, isFetchingNextPage } = useInfiniteQuery(
    reviewQueries.list(team, show),
  );
  if (error) return <ProblemNotice fault={asProblem(error)} onTryAgain={() => void refetch()} />;
  if (data === undefined) return <Waiting>Reading the reviews…</Waiting>;
  const reviews = data.pages.flatMap(({ items }) => items);
  if (reviews.length === 0) return <NoReviews team={team} show={show} role={role} />;
  return (
    <div className="space-y-3">
      <ul className="review-list">
        {reviews.map((review) => (
          <ReviewRow key={`${review.tableSlug} ${review.number}`} team={team} review={review} />
        ))}
      </ul>
      <div className="pager">
        <span className="quiet">
          {reviews.length} shown{!hasNextPage && ', all there are'}.{' '}
          {show === 'for-me' || show === 'waiting' ? 'The longest waiting first.' : 'The newest first.'}
        </span>
        {hasNextPage && (
          <Button size="small" isDisabled={isFetchingNextPage} onPress={() => void fetchNextPage()}>
            More
          </Button>
        )}
      </div>
    </div>
  );
}

const nothing: Readonly<Record<ReviewShow, { title: string; words: string }>> = {
  'for-me': {
    title: 'Nothing waits for you',
    words: 'A revision that you may judge appears here as soon as its author submits it.',
  },
  waiting: {
    title: 'Nothing is in review',
    words: 'Revisions that were submitted and not yet judged appear here, whoever may judge them.',
  },
  mine: {
    title: 'You have submitted nothing yet',
    words: 'Open a table, choose the revision that is ready, and press Submit for review.',
  },
  decided: {
    title: 'Nothing has been decided yet',
    words: 'Revisions that were vetted or returned are listed here with who did it and when.',
  },
};

function NoReviews({ team, show, role }: { team: string; show: ReviewShow; role: Role }) {
  const { title, words } = nothing[show];
  return (
    <EmptyState
      title={title}
      actions={
        <Link to={tablesPath(team, show === 'mine' ? 'state=draft' : '')} className="button button-primary">
          {show === 'mine' ? 'Show the drafts' : 'Go to the tables'}
        </Link>
      }
    >
      <p>{words}</p>
      {show === 'for-me' && !includesRole(role, 'reviewer') && (
        <p>Judging takes the role reviewer. As {roleWords[role]} you find your own under Mine.</p>
      )}
    </EmptyState>
  );
}

const roleWords: Readonly<Record<Role, string>> = {
  viewer: 'a viewer',
  author: 'an author',
  reviewer: 'a reviewer',
  admin: 'an admin',
};
