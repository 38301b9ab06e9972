import { createHash, randomBytes } from 'node:crypto';
import { and, eq, isNull } from 'drizzle-orm';
import type { Role } from '../../shared/contract/index.ts';
import type { Executor } from '../db/client.ts';
import { oneTimeLinks, type linkPurposes } from '../db/schema/index.ts';
import { Problem } from '../http/problem.ts';

export type LinkPurpose = (typeof linkPurposes)[number];
export type OneTimeLink = typeof oneTimeLinks.$inferSelect;

const minute = 60 * 1000;
const day = 24 * 60 * minute;

/** How long each kind of link works, in ms. */
const lifetimes: Readonly<Record<LinkPurpose, number>> = {
  'verify-address': day,
  'reset-password': 30 * minute,
  'change-address': day,
  invitation: 7 * day,
};

export interface LinkTarget {
  readonly purpose: LinkPurpose;
  /** The address it is sent to; it works for no other. */
  readonly email: string;
  readonly userId?: number;
  readonly teamId?: number;
  readonly role?: Role;
  readonly createdBy?: number;
}

const hashOf = (token: string) => createHash('sha256').update(token).digest('hex');

/** Makes a link and answers its row and its token; only the token's hash is kept. */
export async function makeLink(
  transaction: Executor,
  target: LinkTarget,
): Promise<{ id: number; token: string }> {
  const token = randomBytes(32).toString('base64url');
  const expiresAt = new Date(Date.now() + lifetimes[target.purpose]);
  const [{ id }] = await transaction
    .insert(oneTimeLinks)
    .values({ ...target, tokenHash: hashOf(token), expiresAt })
    .$returningId();
  return { id, token };
}

/**
 * The link of a token, as long as it works; locked until the transaction ends.
 *
 * @throws {Problem} `not-found`, `link-used` or `link-expired`
 */
export async function findLink(
  transaction: Executor,
  token: string,
  purpose: LinkPurpose,
): Promise<OneTimeLink> {
  const [link] = await transaction
    .select()
    .from(oneTimeLinks)
    .where(and(eq(oneTimeLinks.tokenHash, hashOf(token)), eq(oneTimeLinks.purpose, purpose)))
    .for('update');
  if (!link)
    throw new Problem('not-found', { detail: 'This link is not valid, or a newer one has replaced it.' });
  if (link.usedAt) throw new Problem('link-used', { detail: 'This link works once, and it has been used.' });
  if (link.expiresAt.getTime() <= Date.now()) {
    throw new Problem('link-expired', { detail: `This link worked until ${link.expiresAt.toISOString()}.` });
  }
  return link;
}

export async function markUsed(transaction: Executor, { id }: Pick<OneTimeLink, 'id'>): Promise<void> {
  await transaction.update(oneTimeLinks).set({ usedAt: new Date() }).where(eq(oneTimeLinks.id, id));
}

/** Takes back a person's unused links, of one purpose or of all. */
export async function dropLinks(transaction: Executor, userId: number, purpose?: LinkPurpose): Promise<void> {
  await transaction
    .delete(oneTimeLinks)
    .where(
      and(
        eq(oneTimeLinks.userId, userId),
        isNull(oneTimeLinks.usedAt),
        purpose && eq(oneTimeLinks.purpose, purpose),
      ),
    );
}
