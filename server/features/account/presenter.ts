import type { Account, SignInSession } from '../../../shared/contract/index.ts';
import type { Person } from '../../auth/team-scope.ts';
import type { SessionRow } from './queries.ts';

export const presentAccount = (
  { id, name, email }: Person,
  memberships: Account['memberships'],
): Account => ({
  id,
  name,
  email,
  memberships,
});

export const presentSession = (row: SessionRow, ownId: string): SignInSession => ({
  id: row.id,
  isThisOne: row.id === ownId,
  client: row.client,
  createdAt: row.createdAt.toISOString(),
  lastSeenAt: row.lastSeenAt.toISOString(),
  expiresAt: row.expiresAt.toISOString(),
});
