import { eq } from 'drizzle-orm';
import { noticeKinds, type NoticeChoices } from '../../../shared/contract/index.ts';
import type { Executor } from '../../db/client.ts';
import { noticeChoices } from '../../db/schema/index.ts';

/** What a person wants to be told by mail: everything, but for what they have switched off. */
export async function findChoices(executor: Executor, userId: number): Promise<NoticeChoices> {
  const rows = await executor
    .select({ kind: noticeChoices.kind, isWanted: noticeChoices.isWanted })
    .from(noticeChoices)
    .where(eq(noticeChoices.userId, userId));
  const chosen = new Map(rows.map(({ kind, isWanted }) => [kind, isWanted]));
  return Object.fromEntries(noticeKinds.map((kind) => [kind, chosen.get(kind) ?? true])) as NoticeChoices;
}
