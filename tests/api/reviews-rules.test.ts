import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { includesRole, revisionStates, type RevisionState } from '../../shared/contract/index.ts';
import { asPerson, join, makeCrew, makePerson, type TestPerson } from '../support/people.ts';
import { done, draftOf, setTwoPersonRule, type ReviewOf } from '../support/reviews.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

/** How far a review has come in each state. */
const versions: Readonly<Record<RevisionState, number>> = {
  draft: 1,
  'in-review': 2,
  vetted: 3,
  returned: 3,
  withdrawn: 4,
};

type Move = 'submit' | 'judge' | 'withdraw';
const moves: Readonly<
  Record<
    Move,
    { readonly from: RevisionState; readonly role: 'author' | 'reviewer'; readonly isBarred: boolean }
  >
> = {
  submit: { from: 'draft', role: 'author', isBarred: false },
  judge: { from: 'in-review', role: 'reviewer', isBarred: true },
  withdraw: { from: 'vetted', role: 'reviewer', isBarred: true },
};
const make = (move: Move, review: ReviewOf, person: TestPerson, state: RevisionState) =>
  move === 'submit'
    ? review.submit(person)
    : move === 'judge'
      ? review.vet(person, versions[state])
      : review.withdraw(person, versions[state]);

/** Whose the revision is to the one who tries. */
const ties = ['somebody else’s', 'made by them', 'submitted by them'] as const;

describe('who may do what: by state, role, whose it is, and the two-person rule', () => {
  it.each([
    { rule: true, state: 'draft' },
    ...revisionStates.slice(1).flatMap((state) => [true, false].map((rule) => ({ rule, state }))),
  ] as { rule: boolean; state: RevisionState }[])('$state, rule on: $rule', async ({ rule, state }) => {
    const ruled = await makeCrew(test);
    const [maker, submitter, judge] = await Promise.all(
      ['Maker', 'Submitter', 'Judge'].map((name) => makePerson(test, name)),
    );
    for (const person of [maker, submitter, judge]) await join(test, ruled.team.id, person, 'admin');
    await setTwoPersonRule(test, ruled.team, ruled.admin, rule);

    for (const role of ['viewer', 'author', 'reviewer', 'admin'] as const) {
      const person = ruled[role];
      for (const tie of ties) {
        // A viewer neither makes nor submits; a draft has no submitter.
        if (tie !== ties[0] && (role === 'viewer' || (tie === ties[2] && state === 'draft'))) continue;
        const mine = await draftOf(test, ruled.team, tie === ties[1] ? person : maker);
        if (state !== 'draft') done(await mine.submit(tie === ties[2] ? person : submitter));
        if (state === 'returned') done(await mine.giveBack(judge, 2));
        if (state === 'vetted' || state === 'withdrawn') done(await mine.vet(judge, 2));
        if (state === 'withdrawn') done(await mine.withdraw(judge, 3));

        const { hindrances } = await mine.read(person);
        for (const move of ['submit', 'judge', 'withdraw'] as const) {
          const { from, role: needed, isBarred } = moves[move];
          const isRightState = state === from;
          const has = includesRole(role, needed);
          const barred = isBarred && rule && tie !== ties[0];
          const hindrance = !isRightState ? 'state' : !has ? 'role' : barred ? 'own-revision' : null;
          expect(hindrances[move], `${role} ${tie} ${move}`).toBe(hindrance);

          const answer = await make(move, mine, person, state);
          const status = !has ? 403 : !isRightState ? 409 : barred ? 403 : 200;
          expect([answer.status, answer.text], `${role} ${tie} ${move}`).toEqual([status, answer.text]);
          if (status === 403 && has) {
            expect(answer.body.type).toBe('/problems/two-person-rule');
            expect(answer.body.detail).toContain('two-person rule');
          }
          // What was done cannot be tried again in this state.
          if (status === 200) break;
        }
      }
    }
  });

  it('goes by the rule of that moment, and by the role of that moment', async () => {
    const ruled = await makeCrew(test);
    const own = await draftOf(test, ruled.team, ruled.reviewer);
    await own.submit(ruled.reviewer);
    expect((await own.vet(ruled.reviewer, 2)).status).toBe(403);
    await setTwoPersonRule(test, ruled.team, ruled.admin, false);
    expect((await own.read(ruled.reviewer)).hindrances.judge).toBeNull();
    done(await own.vet(ruled.reviewer, 2));
    await setTwoPersonRule(test, ruled.team, ruled.admin, true);
    expect((await own.withdraw(ruled.reviewer, 3)).body.type).toBe('/problems/two-person-rule');
    await asPerson(test, ruled.admin).patch(`/teams/${ruled.team.slug}/members/${ruled.reviewer.id}`, {
      role: 'author',
    });
    expect((await own.withdraw(ruled.reviewer, 3)).body.type).toBe('/problems/forbidden');
  });
});
