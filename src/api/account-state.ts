import type { Account } from '../../shared/contract/index.ts';
import { createLive, useLive } from '../live/index.ts';

/** Who uses this page. `unknown` until the server has been asked, and where it does not answer. */
export type AccountState =
  | { readonly kind: 'unknown' }
  | { readonly kind: 'nobody' }
  | { readonly kind: 'person'; readonly account: Account };

/** Written at each sign-in and sign-out, so that this browser's other tabs hear of it. */
const changeKey = 'stepwell.account-changed';
/** A page that is come back to after so long asks again, in milliseconds. */
const staleAfterMs = 60_000;

const state = createLive<AccountState>({ kind: 'unknown' });
let askedAt = -Infinity;
let asking: Promise<AccountState> | null = null;

export const useAccountState = (): AccountState => useLive(state);

/** The signed-in person's account, where there is one. */
export function useAccount(): Account | undefined {
  const known = useAccountState();
  return known.kind === 'person' ? known.account : undefined;
}

/** Takes an account that a request has answered. */
export const takeAccount = (account: Account): void => state.set({ kind: 'person', account });

/** Asks the server who is signed in. Where it does not answer, what was known stays. */
export function refreshAccount(take = state.set): Promise<AccountState> {
  asking ??= readAccount()
    .then(take, () => undefined)
    .then(state.now)
    .finally(() => {
      askedAt = performance.now();
      asking = null;
    });
  return asking;
}

/** Asks anew after a sign-in or sign-out, and lets the other tabs know. */
export async function accountHasChanged(): Promise<AccountState> {
  try {
    localStorage.setItem(changeKey, String(Date.now()));
  } catch {
    // Without storage the other tabs find out when they are next come back to.
  }
  await asking;
  return refreshAccount();
}

/**
 * Asks for the session first: it answers nobody with `null`, where the account itself would be refused, which browsers
 * write into their console as an error.
 */
async function readAccount(): Promise<AccountState> {
  const session: unknown = await getJson('/auth/session');
  if (session === null) return { kind: 'nobody' };
  const account = await getJson('/api/v1/account');
  if (!isAccount(account)) throw new TypeError('no account');
  return { kind: 'person', account };
}

async function getJson(address: string): Promise<unknown> {
  const response = await fetch(address, { headers: { Accept: 'application/json' } });
  if (!response.ok) throw new Error(`status ${response.status}`);
  return response.json();
}

/** The first page carries no schema for this: it looks for what it uses. */
const isAccount = (answer: unknown): answer is Account =>
  typeof answer === 'object' &&
  answer !== null &&
  'name' in answer &&
  'memberships' in answer &&
  Array.isArray(answer.memberships);

/**
 * A sign-in that has run out meanwhile is not taken away from under what somebody is typing: the next request finds it
 * gone, and asks to sign in again on top.
 */
function takeQuietly(next: AccountState): void {
  if (next.kind === 'person' || state.now().kind !== 'person') state.set(next);
}

/** Begins to keep the state fresh; answers how to stop. */
export function watchAccount(): () => void {
  const ask = () => void refreshAccount();
  const askQuietly = () => void refreshAccount(takeQuietly);
  const onStorage = (event: StorageEvent) => {
    if (event.key === changeKey) ask();
  };
  const onVisible = () => {
    const isStale = performance.now() - askedAt > staleAfterMs;
    if (document.visibilityState === 'visible' && isStale && navigator.onLine) askQuietly();
  };
  ask();
  addEventListener('storage', onStorage);
  addEventListener('online', askQuietly);
  document.addEventListener('visibilitychange', onVisible);
  return () => {
    removeEventListener('storage', onStorage);
    removeEventListener('online', askQuietly);
    document.removeEventListener('visibilitychange', onVisible);
  };
}
