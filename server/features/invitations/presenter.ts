import type { Invitation } from '../../../shared/contract/index.ts';
import type { InvitationRow } from './queries.ts';

export const presentInvitation = (row: InvitationRow): Invitation => ({
  id: row.id,
  email: row.email,
  // An invitation's link always has a role; other links have none.
  role: row.role ?? 'viewer',
  invitedBy: row.invitedBy,
  // The note of a mail that was sent is deleted after a while.
  delivery: row.delivery ?? 'sent',
  createdAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt.toISOString(),
});
