import { eq } from 'drizzle-orm';
import { Router, type Request } from 'express';
import {
  changeAccountSchema,
  changeAddressSchema,
  changePasswordSchema,
  deleteAccountSchema,
  emailOnlySchema,
  resetPasswordSchema,
  signUpSchema,
  tokenOnlySchema,
} from '../../../shared/contract/index.ts';
import { clearSessionCookie, endSession, endSessions, setSessionCookie } from '../../auth/sessions.ts';
import { tokenSettings } from '../../auth/sign-in-state.ts';
import { requireUser, sessionIdOf, userOf } from '../../auth/team-scope.ts';
import { users } from '../../db/schema/index.ts';
import type { Feature } from '../../feature.ts';
import { inEvenTime } from '../../http/even-time.ts';
import { networkOf } from '../../http/network.ts';
import { parseInput } from '../../http/parse-input.ts';
import { Problem } from '../../http/problem.ts';
import { heed, limitRate, rateLimiter } from '../../http/rate-limiter.ts';
import type { RatePolicyName } from '../../http/rate-policies.ts';
import { askForAddress, confirmAddress } from './address-commands.ts';
import { deleteAccount } from './delete-account.ts';
import { changePassword, forgotPassword, resetPassword } from './password-commands.ts';
import { presentAccount, presentSession } from './presenter.ts';
import { findMemberships, findSessions } from './queries.ts';
import { resendVerification, signUp, verifyAddress } from './sign-up.ts';

/** One's own account: from sign-up to its end, with its sessions. What is mailed is answered alike for any address. */
export const account: Feature = (deps) => {
  const { db } = deps.database;
  const limiter = rateLimiter(deps);
  const byNetwork = (policy: RatePolicyName) => limitRate(limiter, policy, networkOf);
  const byAddress = (email: string) => limiter.count('mail-to-address', email);
  const passwordChecks = limitRate(limiter, 'password-check', (request) => String(userOf(request).id));
  const router = Router();

  router.post('/account/sign-up', byNetwork('sign-up'), async (request, response) => {
    const typed = parseInput(signUpSchema, request.body);
    heed(response, await byAddress(typed.email));
    await inEvenTime(() => signUp(deps, typed));
    response.status(202).end();
  });
  router.post('/account/resend-verification', byNetwork('mail-request'), async (request, response) => {
    const { email } = parseInput(emailOnlySchema, request.body);
    heed(response, await byAddress(email));
    await inEvenTime(() => resendVerification(deps, email));
    response.status(202).end();
  });
  router.post('/account/forgot-password', byNetwork('mail-request'), async (request, response) => {
    const { email } = parseInput(emailOnlySchema, request.body);
    heed(response, await byAddress(email));
    await inEvenTime(() => forgotPassword(deps, email));
    response.status(202).end();
  });

  router.post('/account/verify-address', byNetwork('link-use'), async (request, response) => {
    response.json(await verifyAddress(deps, parseInput(tokenOnlySchema, request.body).token));
  });
  router.post('/account/reset-password', byNetwork('link-use'), async (request, response) => {
    response.json(await resetPassword(deps, parseInput(resetPasswordSchema, request.body)));
  });
  router.post('/account/confirm-address', byNetwork('link-use'), async (request, response) => {
    response.json(await confirmAddress(deps, parseInput(tokenOnlySchema, request.body).token));
  });

  router.get('/account', requireUser, async (request, response) => {
    const user = userOf(request);
    response.json(presentAccount(user, await findMemberships(db, user.id)));
  });
  router.patch('/account', requireUser, async (request, response) => {
    const user = userOf(request);
    const { name } = parseInput(changeAccountSchema, request.body);
    await db.update(users).set({ name }).where(eq(users.id, user.id));
    response.json(presentAccount({ ...user, name }, await findMemberships(db, user.id)));
  });
  router.delete('/account', requireUser, passwordChecks, async (request, response) => {
    const { currentPassword } = parseInput(deleteAccountSchema, request.body);
    await deleteAccount(deps, userOf(request), currentPassword);
    clearSessionCookie(response, tokenSettings(deps));
    response.status(204).end();
  });
  router.post('/account/change-password', requireUser, passwordChecks, async (request, response) => {
    const typed = parseInput(changePasswordSchema, request.body);
    const session = await changePassword(deps, userOf(request).id, typed, request.get('User-Agent'));
    await setSessionCookie(response, session, tokenSettings(deps));
    response.status(204).end();
  });
  router.post('/account/change-address', requireUser, passwordChecks, async (request, response) => {
    const typed = parseInput(changeAddressSchema, request.body);
    heed(response, await byAddress(typed.email));
    await inEvenTime(() => askForAddress(deps, userOf(request), typed));
    response.status(202).end();
  });

  router.get('/account/sessions', requireUser, async (request, response) => {
    const rows = await findSessions(db, userOf(request).id);
    response.json({ items: rows.map((row) => presentSession(row, sessionIdOf(request))), nextCursor: null });
  });
  router.delete('/account/sessions', requireUser, async (request, response) => {
    await endSessions(db, userOf(request).id, sessionIdOf(request));
    response.status(204).end();
  });
  router.delete('/account/sessions/:id', requireUser, async (request: Request<{ id: string }>, response) => {
    const hasEnded = await endSession(db, userOf(request).id, request.params.id);
    if (!hasEnded) throw new Problem('not-found', { detail: 'You have no such session.' });
    response.status(204).end();
  });
  return router;
};
