import {
  changeLimitSetSchema,
  commentSchema,
  commentsPageSchema,
  commentsQuerySchema,
  createCommentSchema,
  createLimitSetSchema,
  giveVerdictSchema,
  limitSetSchema,
  limitSetsListSchema,
  reviewSchema,
  reviewsPageSchema,
  reviewsQuerySchema,
  submitRevisionSchema,
  withdrawRevisionSchema,
} from '../../../../shared/contract/index.ts';
import type { Answer, Section } from '../operation.ts';

const review: Answer = {
  status: 200,
  description: 'The review as it is now',
  schema: reviewSchema,
  headers: ['ETag'],
};
const revision = '/teams/:team/tables/:table/revisions/:number';
const ownRevision =
  "While the team's two-person rule is on, whoever made or submitted the revision is refused (403).";

export const reviews: Section = {
  name: 'Reviews',
  description:
    'A revision goes from draft to review, is vetted or returned for good, and may be withdrawn once it was vetted. ' +
    'It can be read and exported in every state.',
  operations: [
    {
      id: 'listReviews',
      method: 'get',
      path: '/teams/:team/reviews',
      summary: 'List what waits for review and what was decided',
      description: 'A `nextCursor` is good for the same `show` only.',
      access: 'viewer',
      query: reviewsQuerySchema,
      answer: { status: 200, description: 'A page of reviews', schema: reviewsPageSchema },
    },
    {
      id: 'readReview',
      method: 'get',
      path: `${revision}/review`,
      summary: 'Read how a revision stands in review and against the limits',
      access: 'viewer',
      answer: review,
    },
    {
      id: 'submitRevision',
      method: 'post',
      path: `${revision}/submit`,
      summary: 'Submit a draft for review',
      access: 'author',
      body: submitRevisionSchema,
      repeatable: true,
      answer: review,
      refusals: [409],
    },
    {
      id: 'giveVerdict',
      method: 'post',
      path: `${revision}/verdict`,
      summary: 'Vet or return a revision in review',
      description:
        'The limits are checked at that moment and kept with the verdict. To return, or to vet against a failed ' +
        `limit, takes a note (422). ${ownRevision}`,
      access: 'reviewer',
      body: giveVerdictSchema,
      conditional: true,
      repeatable: true,
      answer: review,
      refusals: [409],
    },
    {
      id: 'withdrawRevision',
      method: 'post',
      path: `${revision}/withdraw`,
      summary: 'Withdraw a vetted revision',
      description: `It can still be read and exported, and says so. ${ownRevision}`,
      access: 'reviewer',
      body: withdrawRevisionSchema,
      conditional: true,
      repeatable: true,
      answer: review,
      refusals: [409],
    },
    {
      id: 'listComments',
      method: 'get',
      path: `${revision}/comments`,
      summary: 'List the comments on a revision, oldest first',
      access: 'viewer',
      query: commentsQuerySchema,
      answer: { status: 200, description: 'A page of comments', schema: commentsPageSchema },
    },
    {
      id: 'addComment',
      method: 'post',
      path: `${revision}/comments`,
      summary: 'Comment on a revision or on one setting of it, in any state',
      access: 'author',
      body: createCommentSchema,
      repeatable: true,
      answer: { status: 201, description: 'The comment', schema: commentSchema },
      refusals: [409],
    },
  ],
};

const limits: Answer = {
  status: 200,
  description: 'The limits as they are now',
  schema: limitSetSchema,
  headers: ['ETag'],
};

export const limitSets: Section = {
  name: 'Limits',
  description:
    'What tables of a team have to keep to be vetted: general limits, and further ones for the tables with a tag.',
  operations: [
    {
      id: 'listLimitSets',
      method: 'get',
      path: '/teams/:team/limit-sets',
      summary: 'List the limits of a team',
      access: 'viewer',
      answer: {
        status: 200,
        description: 'The general limits, then those of tags',
        schema: limitSetsListSchema,
      },
    },
    {
      id: 'createLimitSet',
      method: 'post',
      path: '/teams/:team/limit-sets',
      summary: 'Set limits, in general or for a tag',
      access: 'admin',
      body: createLimitSetSchema,
      repeatable: true,
      answer: { ...limits, status: 201, description: 'The new limits', headers: ['ETag', 'Location'] },
      refusals: [409],
    },
    {
      id: 'changeLimitSet',
      method: 'put',
      path: '/teams/:team/limit-sets/:id',
      summary: 'Change limits as a whole; verdicts keep those they were given by',
      access: 'admin',
      body: changeLimitSetSchema,
      conditional: true,
      answer: limits,
    },
    {
      id: 'deleteLimitSet',
      method: 'delete',
      path: '/teams/:team/limit-sets/:id',
      summary: 'Ask for these limits no longer',
      access: 'admin',
      conditional: true,
      answer: { status: 204, description: 'Done' },
    },
  ],
};
