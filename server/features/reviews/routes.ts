import { Router, type Request, type Response } from 'express';
import {
  commentsQuerySchema,
  createCommentSchema,
  giveVerdictSchema,
  reviewsQuerySchema,
  submitRevisionSchema,
  withdrawRevisionSchema,
  type Review,
} from '../../../shared/contract/index.ts';
import { requireTeam, teamOf, userOf } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import type { Feature } from '../../feature.ts';
import { answerOnce } from '../../http/idempotency.ts';
import { readCursor, writeCursor } from '../../http/list-cursor.ts';
import { parseInput } from '../../http/parse-input.ts';
import { etagOf, preconditionOf } from '../../http/preconditions.ts';
import { limitRate, rateLimiter } from '../../http/rate-limiter.ts';
import type { RatePolicyName } from '../../http/rate-policies.ts';
import { queueNotices } from '../../notices/queue-notices.ts';
import { readLimitSets } from '../../tables/limit-sets.ts';
import { noRevision } from '../../tables/not-there.ts';
import { numberOf } from '../../tables/revision-number.ts';
import { addComment } from './comment-commands.ts';
import { giveVerdict, submitRevision, withdrawRevision, type Command } from './commands.ts';
import { countWaitingFor, findReviews } from './list-reviews.ts';
import { presentComment, presentReview, presentSummary } from './presenter.ts';
import {
  findReview,
  findRevisionId,
  findTwoPersonRule,
  listComments,
  readSummaries,
  type RevisionPlace,
} from './queries.ts';

type RevisionRequest = Request<{ team: string; table: string; number: string }>;

/** Reviews of revisions: asked for, given, withdrawn, and what is said about them. */
export const reviews: Feature = (deps) => {
  const { db } = deps.database;
  const limiter = rateLimiter(deps);
  const byPerson = (policy: RatePolicyName) =>
    limitRate(limiter, policy, (request) => String(userOf(request).id));
  const router = Router();

  router.get('/teams/:team/reviews', requireTeam('viewer'), async (request, response) => {
    const { teamId, role, user } = teamOf(request);
    const query = parseInput(reviewsQuerySchema, request.query, 'query');
    const asker = { userId: user.id, role, twoPersonRule: await findTwoPersonRule(db, teamId) };
    const [{ ids, nextCursor }, waitingForMe] = await Promise.all([
      findReviews(db, teamId, asker, query),
      countWaitingFor(db, teamId, asker),
    ]);
    const rows = await readSummaries(db, teamId, ids);
    response.json({ items: rows.map((row) => presentSummary(row, asker)), nextCursor, waitingForMe });
  });

  const revision = '/teams/:team/tables/:table/revisions/:number';

  router.get(`${revision}/review`, requireTeam('viewer'), async (request: RevisionRequest, response) => {
    const { teamId, role, user } = teamOf(request);
    const place = placeOf(request);
    const [row, sets, twoPersonRule] = await Promise.all([
      findReview(db, place),
      readLimitSets(db, teamId),
      findTwoPersonRule(db, teamId),
    ]);
    if (!row) throw noRevision(place.slug, place.number);
    const review = presentReview(row, sets, { userId: user.id, role, twoPersonRule });
    response.set(headersOf(review)).json(review);
  });

  /** Runs a command on the revision once, and answers the review as it is then. */
  const answerReview = (
    request: RevisionRequest,
    response: Response,
    run: (command: Command) => Promise<Review>,
  ) =>
    answerOnce(request, response, db, async (transaction) => {
      const review = await run(commandOf(request, transaction));
      return { status: 200, headers: headersOf(review), body: review };
    });
  const commandOf = (request: RevisionRequest, transaction: Executor): Command => {
    const scope = teamOf(request);
    return {
      transaction,
      auditKey: deps.config.auditKey,
      scope,
      tell: (notice) => queueNotices(transaction, deps, scope, notice),
      ...placeOf(request),
    };
  };

  router.post(
    `${revision}/submit`,
    requireTeam('author'),
    byPerson('submissions'),
    async (request: RevisionRequest, response) => {
      const input = parseInput(submitRevisionSchema, request.body);
      await answerReview(request, response, (command) => submitRevision(command, input));
    },
  );

  router.post(`${revision}/verdict`, requireTeam('reviewer'), async (request: RevisionRequest, response) => {
    const precondition = preconditionOf(request);
    const input = parseInput(giveVerdictSchema, request.body);
    await answerReview(request, response, (command) => giveVerdict(command, precondition, input));
  });

  router.post(`${revision}/withdraw`, requireTeam('reviewer'), async (request: RevisionRequest, response) => {
    const precondition = preconditionOf(request);
    const input = parseInput(withdrawRevisionSchema, request.body);
    await answerReview(request, response, (command) => withdrawRevision(command, precondition, input));
  });

  router.get(`${revision}/comments`, requireTeam('viewer'), async (request: RevisionRequest, response) => {
    const { teamId } = teamOf(request);
    const place = placeOf(request);
    const { cursor, limit } = parseInput(commentsQuerySchema, request.query, 'query');
    const revisionId = await findRevisionId(db, place);
    if (revisionId === undefined) throw noRevision(place.slug, place.number);
    const question = ['comments', revisionId];
    const after = cursor === undefined ? 0 : readCursor(question, cursor).id;
    const rows = await listComments(db, teamId, revisionId, limit + 1, after);
    const page = rows.slice(0, limit);
    const last = page.at(-1);
    response.json({
      items: page.map(presentComment),
      nextCursor:
        last && rows.length > page.length ? writeCursor(question, { key: null, id: last.id }) : null,
    });
  });

  router.post(
    `${revision}/comments`,
    requireTeam('author'),
    byPerson('comments'),
    async (request: RevisionRequest, response) => {
      const input = parseInput(createCommentSchema, request.body);
      await answerOnce(request, response, db, async (transaction) => ({
        status: 201,
        body: await addComment(commandOf(request, transaction), input),
      }));
    },
  );

  return router;
};

const headersOf = ({ version }: Review) => ({ ETag: etagOf(version) });

/** @throws {Problem} `not-found` where the address can name no revision */
function placeOf(request: RevisionRequest): RevisionPlace {
  const { table, number } = request.params;
  const wanted = numberOf(number);
  if (wanted === undefined) throw noRevision(table, number);
  return { teamId: teamOf(request).teamId, slug: table, number: wanted };
}
