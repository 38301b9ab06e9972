import { expect } from 'vitest';
import type { Test } from 'supertest';
import type { Comment, LimitSet, Review, VettingLimits } from '../../shared/contract/index.ts';
import { saveTable } from './library.ts';
import { asPerson, type TestPerson, type TestTeam } from './people.ts';
import type { TestApp } from './test-app.ts';

/** What persons do with one revision, over HTTP. */
export function reviewOf(test: TestApp, team: TestTeam, slug: string, number = 1) {
  const revision = `/teams/${team.slug}/tables/${slug}/revisions/${number}`;
  const post = (person: TestPerson, below: string, body: object, version?: number): Test => {
    const sent = asPerson(test, person).post(`${revision}/${below}`, body);
    return version === undefined ? sent : sent.set('If-Match', `"${version}"`);
  };
  return {
    revision,
    submit: (person: TestPerson, message = 'Please look.') => post(person, 'submit', { message }),
    vet: (person: TestPerson, version: number, note = '') =>
      post(person, 'verdict', { verdict: 'vetted', note }, version),
    giveBack: (person: TestPerson, version: number, note = 'Not yet.') =>
      post(person, 'verdict', { verdict: 'returned', note }, version),
    withdraw: (person: TestPerson, version: number, reason = 'Wrong after all.') =>
      post(person, 'withdraw', { reason }, version),
    comment: (person: TestPerson, body: object) => post(person, 'comments', body),
    read: async (person: TestPerson): Promise<Review> =>
      done(await asPerson(test, person).get(`${revision}/review`)),
    comments: async (
      person: TestPerson,
      query = '',
    ): Promise<{ items: Comment[]; nextCursor: string | null }> =>
      done(await asPerson(test, person).get(`${revision}/comments${query}`)),
  };
}
export type ReviewOf = ReturnType<typeof reviewOf>;

/** A new table of the maker's with one draft. */
export async function draftOf(
  test: TestApp,
  team: TestTeam,
  maker: TestPerson,
  title = 'Reviewed',
  changes: object = {},
): Promise<ReviewOf & { readonly slug: string }> {
  const { slug } = await saveTable(test, team, maker, title, changes);
  return { slug, ...reviewOf(test, team, slug) };
}

export async function setLimits(
  test: TestApp,
  team: TestTeam,
  admin: TestPerson,
  limits: VettingLimits,
  tag: string | null = null,
): Promise<LimitSet> {
  return done(await asPerson(test, admin).post(`/teams/${team.slug}/limit-sets`, { tag, limits }), 201);
}

export async function setTwoPersonRule(
  test: TestApp,
  team: TestTeam,
  admin: TestPerson,
  twoPersonRule: boolean,
): Promise<void> {
  const path = `/teams/${team.slug}`;
  const { headers } = await asPerson(test, admin).get(path);
  done(await asPerson(test, admin).patch(path, { twoPersonRule }).set('If-Match', headers.etag));
}

/** The answer's body, where it is the answer that was meant. */
export function done<Body>(
  response: { readonly status: number; readonly text: string; readonly body: Body },
  status = 200,
): Body {
  expect(response.status, response.text).toBe(status);
  return response.body;
}
