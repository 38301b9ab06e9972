import { useSyncExternalStore } from 'react';
import type { Account } from '../../shared/contract/index.ts';

/** Who uses this page. `unknown` until the server has been asked, and where it does not answer. */
export type AccountState =
  | { readonly kind: 'unknown' }
  | { readonly kind: 'nobody' }
  | { readonly kind: 'person'; readonly account: Account };

/** Written at each sign-in and sign-out, so that this browser's other tabs hear of it. */
const changeKey = 'stepwell.account-changed';
/** A page that is come back to after so long asks again, in milliseconds. */
const staleAfterMs = 60_000;

let state: AccountState = { kind: 'unknown' };
let askedAt = -Infinity;
let asking: Promise<AccountState> | null = null;
const listeners = new Set<() => void>();

export const accountState = (): AccountState => state;

function set(next: AccountState): AccountState {
  state = next;
  for (const listener of listeners) listener();
  return next;
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

export const useAccountState = (): AccountState => useSyncExternalStore(subscribe, accountState);

/** The signed-in person's account, where there is one. */
export function useAccount(): Account | undefined {
  const known = useAccountState();
  return known.kind === 'person' ? known.account : undefined;
}

/** Takes an account that a request has answered. */
export const takeAccount = (account: Account): AccountState => set({ kind: 'person', account });

/** Asks the server who is signed in. Where it does not answer, what was known stays. */
export function refreshAccount(): Promise<AccountState> {
  asking ??= readAccount()
    .then(set, () => state)
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

/** Begins to keep the state fresh; answers how to stop. */
export function watchAccount(): () => void {
  const ask = () => void refreshAccount();
  const onStorage = (event: StorageEvent) => {
    if (event.key === changeKey) ask();
  };
  const onVisible = () => {
    const isStale = performance.now() - askedAt > staleAfterMs;
    if (document.visibilityState === 'visible' && isStale && navigator.onLine) ask();
  };
  ask();
  addEventListener('storage', onStorage);
  addEventListener('online', ask);
  document.addEventListener('visibilitychange', onVisible);
  return () => {
    removeEventListener('storage', onStorage);
    removeEventListener('online', ask);
    document.removeEventListener('visibilitychange', onVisible);
  };
}
