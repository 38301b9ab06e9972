import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { mailOutbox, oneTimeLinks } from '../../server/db/schema/index.ts';
import { freshAddress, mailsTo, tokenSentTo } from '../support/outbox.ts';
import { asPerson, makeCrew, makePerson, makeTeam, type TestPerson } from '../support/people.ts';
import { makeTestApp, origin, type TestApp } from '../support/test-app.ts';

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

const as = (person?: TestPerson) => asPerson(test, person);
const invite = (person: TestPerson | undefined, slug: string, email: string, role = 'author') =>
  as(person).post(`/teams/${slug}/invitations`, { email, role });

describe('POST /teams/:team/invitations', () => {
  it('sends a link that shows the team, the role and the address', async () => {
    const { team, admin } = await makeCrew(test);
    const email = freshAddress();
    const response = await invite(admin, team.slug, email);
    expect(response.status).toBe(201);
    expect(response.body).toMatchObject({
      email,
      role: 'author',
      invitedBy: admin.name,
      delivery: 'waiting',
    });
    const [mail] = await mailsTo(test, email);
    expect(mail.subject).toBe('Invitation to the team Ninth Fathom');
    expect(mail.textBody).toContain(`${origin}/invitation#`);
    const opened = await as().post('/invitations/open', { token: await tokenSentTo(test, email) });
    expect([opened.status, opened.body]).toEqual([
      200,
      { teamName: 'Ninth Fathom', teamSlug: team.slug, role: 'author', email },
    ]);
  });

  it('takes an admin: 401 nobody, 404 strangers, 403 the others', async () => {
    const { team, viewer, author, reviewer } = await makeCrew(test);
    const email = freshAddress();
    expect((await invite(undefined, team.slug, email)).status).toBe(401);
    expect((await invite(await makePerson(test), team.slug, email)).status).toBe(404);
    for (const person of [viewer, author, reviewer])
      expect((await invite(person, team.slug, email)).status).toBe(403);
    expect(await mailsTo(test, email)).toHaveLength(0);
  });

  it('refuses a member’s address, a role that is none, no address', async () => {
    const { team, viewer, admin } = await makeCrew(test);
    expect((await invite(admin, team.slug, viewer.email.toUpperCase())).status).toBe(409);
    expect((await invite(admin, team.slug, freshAddress(), 'owner')).status).toBe(422);
    expect((await invite(admin, team.slug, 'nobody')).status).toBe(422);
  });

  it('replaces an open invitation of the same address', async () => {
    const { team, admin } = await makeCrew(test);
    const email = freshAddress();
    await invite(admin, team.slug, email, 'viewer');
    const old = await tokenSentTo(test, email);
    await invite(admin, team.slug, email, 'reviewer');
    expect((await as().post('/invitations/open', { token: old })).status).toBe(404);
    const list = await as(admin).get(`/teams/${team.slug}/invitations`);
    expect((list.body as { items: { role: string }[] }).items.map(({ role }) => role)).toEqual(['reviewer']);
  });

  it('sends one mail for a request that is repeated with its key', async () => {
    const { team, admin } = await makeCrew(test);
    const [email, key] = [freshAddress(), randomUUID()];
    const first = await invite(admin, team.slug, email).set('Idempotency-Key', key);
    const second = await invite(admin, team.slug, email).set('Idempotency-Key', key);
    expect(second.body).toEqual(first.body);
    expect(await mailsTo(test, email)).toHaveLength(1);
  });
});

describe('open invitations', () => {
  it('are listed for admins, with how far their mail has come', async () => {
    const { team, author, admin } = await makeCrew(test);
    const email = freshAddress();
    await invite(admin, team.slug, email);
    await test.database.db
      .update(mailOutbox)
      .set({ state: 'undelivered' })
      .where(eq(mailOutbox.recipient, email));
    const list = await as(admin).get(`/teams/${team.slug}/invitations`);
    expect(list.body).toMatchObject({ items: [{ email, delivery: 'undelivered' }], nextCursor: null });
    expect((await as().get(`/teams/${team.slug}/invitations`)).status).toBe(401);
    expect((await as(await makePerson(test)).get(`/teams/${team.slug}/invitations`)).status).toBe(404);
    expect((await as(author).get(`/teams/${team.slug}/invitations`)).status).toBe(403);
  });

  it('are withdrawn by an admin of the team, and work no longer', async () => {
    const { team, author, admin } = await makeCrew(test);
    const email = freshAddress();
    const { id } = (await invite(admin, team.slug, email)).body as { id: number };
    const path = `/teams/${team.slug}/invitations/${id}`;
    const foreign = await makePerson(test);
    const theirs = await makeTeam(test, [{ person: foreign, role: 'admin' }]);
    expect((await as().delete(path)).status).toBe(401);
    expect((await as(foreign).delete(path)).status).toBe(404);
    expect((await as(foreign).delete(`/teams/${theirs.slug}/invitations/${id}`)).status).toBe(404);
    expect((await as(author).delete(path)).status).toBe(403);
    expect((await as(admin).delete(path)).status).toBe(204);
    expect((await as(admin).delete(path)).status).toBe(404);
    expect((await as().post('/invitations/open', { token: await tokenSentTo(test, email) })).status).toBe(
      404,
    );
  });

  it('do not let other links be withdrawn in their place', async () => {
    const { team, admin } = await makeCrew(test);
    const email = freshAddress();
    await as().post('/account/sign-up', { name: 'X', email, password: 'nine fathoms deep' });
    const [link] = await test.database.db.select().from(oneTimeLinks).where(eq(oneTimeLinks.email, email));
    expect((await as(admin).delete(`/teams/${team.slug}/invitations/${link.id}`)).status).toBe(404);
  });
});

describe('POST /invitations/accept', () => {
  const accept = (person: TestPerson | undefined, token: string) =>
    as(person).post('/invitations/accept', { token });

  it('makes a member of who has the address', async () => {
    const { team, admin } = await makeCrew(test);
    const guest = await makePerson(test);
    await invite(admin, team.slug, guest.email, 'reviewer');
    const response = await accept(guest, await tokenSentTo(test, guest.email));
    expect([response.status, response.body]).toEqual([
      200,
      { teamName: 'Ninth Fathom', teamSlug: team.slug, role: 'reviewer', email: guest.email },
    ]);
    expect((await as(guest).get(`/teams/${team.slug}`)).body).toMatchObject({ myRole: 'reviewer' });
    const open = await as(admin).get(`/teams/${team.slug}/invitations`);
    expect((open.body as { items: unknown[] }).items).toHaveLength(0);
  });

  it('is bound to the address', async () => {
    const { team, admin } = await makeCrew(test);
    const [guest, thief] = [await makePerson(test), await makePerson(test)];
    await invite(admin, team.slug, guest.email);
    const token = await tokenSentTo(test, guest.email);
    expect((await accept(undefined, token)).status).toBe(401);
    expect((await accept(thief, token)).status).toBe(403);
    expect((await as(thief).get(`/teams/${team.slug}`)).status).toBe(404);
    expect((await accept(guest, token)).status).toBe(200);
  });

  it('works once, and says so', async () => {
    const { team, admin } = await makeCrew(test);
    const guest = await makePerson(test);
    await invite(admin, team.slug, guest.email);
    const token = await tokenSentTo(test, guest.email);
    await accept(guest, token);
    const again = await accept(guest, token);
    expect(again.body).toMatchObject({ status: 410, type: '/problems/link-used' });
    expect((await as().post('/invitations/open', { token })).status).toBe(410);
    await as(admin).delete(`/teams/${team.slug}/members/${guest.id}`);
    expect((await accept(guest, token)).status).toBe(410);
    expect((await as(guest).get(`/teams/${team.slug}`)).status).toBe(404);
  });

  it('makes one member of five who use the link at once', async () => {
    const { team, admin } = await makeCrew(test);
    const guest = await makePerson(test);
    await invite(admin, team.slug, guest.email);
    const token = await tokenSentTo(test, guest.email);
    const answers = await Promise.all(Array.from({ length: 5 }, () => accept(guest, token)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 410, 410, 410, 410]);
  });

  it('runs out after seven days', async () => {
    const { team, admin } = await makeCrew(test);
    const guest = await makePerson(test);
    const { id, expiresAt } = (await invite(admin, team.slug, guest.email)).body as {
      id: number;
      expiresAt: string;
    };
    expect((Date.parse(expiresAt) - Date.now()) / 86_400_000).toBeCloseTo(7, 2);
    await test.database.db
      .update(oneTimeLinks)
      .set({ expiresAt: new Date(Date.now() - 1) })
      .where(eq(oneTimeLinks.id, id));
    const response = await accept(guest, await tokenSentTo(test, guest.email));
    expect(response.body).toMatchObject({ status: 410, type: '/problems/link-expired' });
  });

  it('refuses what is no token', async () => {
    const guest = await makePerson(test);
    expect((await accept(guest, 'x')).status).toBe(422);
    expect((await accept(guest, 'A'.repeat(43))).status).toBe(404);
    expect((await as(guest).post('/invitations/accept', {})).status).toBe(422);
  });
});
