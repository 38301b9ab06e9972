import type { Account } from '../../shared/contract/index.ts';
import { createLive, useLive } from '../live/index.ts';
import { useAccount } from './account-state.ts';

export type Membership = Account['memberships'][number];

const storageKey = 'stepwell.team';
const chosen = createLive(readKept());

function readKept(): string | null {
  try {
    return localStorage.getItem(storageKey);
  } catch {
    return null;
  }
}

/** Makes a team the one that places lead to and new tables go into. */
export function chooseTeam(slug: string): void {
  if (slug === chosen.now()) return;
  try {
    localStorage.setItem(storageKey, slug);
  } catch {
    // The choice then lasts as long as the page.
  }
  chosen.set(slug);
}

/** The chosen team among an account's, else its first. */
export const teamAmong = (memberships: readonly Membership[], slug: string | null): Membership | undefined =>
  memberships.find(({ teamSlug }) => teamSlug === slug) ?? memberships[0];

/** The team that is in use; none where nobody is signed in, or in no team. */
export function useCurrentTeam(): Membership | undefined {
  const slug = useLive(chosen);
  return teamAmong(useAccount()?.memberships ?? [], slug);
}
