import { ownPath, paths } from '../../paths.ts';
import { keptInvitation } from './kept-invitation.ts';

/** Where to go once signed in: an invitation that waits, the place that asked, else the bench with its wave. */
export function nextPlace(to: string | null = null): string {
  const invitation = keptInvitation.read();
  return invitation === null ? (ownPath(to) ?? paths.bench) : `${paths.invitation}#${invitation}`;
}
