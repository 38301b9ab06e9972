import { accountHasChanged } from './account-state.ts';
import { fetchOrSay } from './client.ts';
import { ProblemError } from './problem-error.ts';
import { readRates, type RateStanding } from './rate-standing.ts';

/**
 * Signs in by Auth.js's own protocol: it tells its outcome by an address to go on to.
 *
 * @throws {ProblemError} `wrong-sign-in`, `unverified`, `too-many-requests` or what kept the answer away
 */
export async function signIn(email: string, password: string): Promise<void> {
  const response = await post('/auth/callback/credentials', { email, password });
  const rates = readRates(response.headers.get('RateLimit'));
  const { url, detail } = await answerOf<{ url?: string; detail?: string }>(response);
  const outcome = new URL(url ?? '/', location.origin).searchParams;
  if (!response.ok || outcome.has('error')) {
    throw refusalOf(outcome.get('code') ?? '', response.status, detail, rates);
  }
  await accountHasChanged();
}

export async function signOut(): Promise<void> {
  await post('/auth/signout', {});
  await accountHasChanged();
}

async function post(address: string, content: object): Promise<Response> {
  const csrf = await fetchOrSay('/auth/csrf');
  const { csrfToken } = await answerOf<{ csrfToken?: string }>(csrf);
  return fetchOrSay(address, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', 'X-Auth-Return-Redirect': '1' },
    body: JSON.stringify({ ...content, csrfToken, callbackUrl: `${location.origin}/` }),
  });
}

/** What is not JSON comes from something that stands between, and says nothing of the sign-in. */
async function answerOf<Answer extends object>(response: Response): Promise<Partial<Answer>> {
  return response.json().catch(() => ({})) as Promise<Partial<Answer>>;
}

function refusalOf(
  code: string,
  status: number,
  detail: string | undefined,
  rates: readonly RateStanding[],
): ProblemError {
  switch (code) {
    case 'unverified':
      return new ProblemError({
        kind: 'unverified',
        status,
        message: 'This address has not been verified yet. Open the link that was mailed to it.',
        rates,
      });
    case 'throttled':
      return new ProblemError({
        kind: 'too-many-requests',
        status: 429,
        message: detail ?? 'Too many tries. Wait a while, then try again.',
        rates,
      });
    case 'credentials':
      return new ProblemError({
        kind: 'wrong-sign-in',
        status,
        message: 'Address and password do not belong together.',
        rates,
      });
    default:
      return new ProblemError({
        kind: 'sign-in',
        status,
        message: 'Signing in did not work. Load the page again, then try once more.',
        rates,
      });
  }
}
