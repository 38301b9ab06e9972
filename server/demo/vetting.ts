import { addComment } from '../features/reviews/comment-commands.ts';
import { giveVerdict, submitRevision, withdrawRevision, type Command } from '../features/reviews/commands.ts';
import type { DemoRevision } from './library.ts';
import type { Role } from '../../shared/contract/index.ts';

const unhindered = { holds: () => true };

/** Plays what became of a revision, by the same commands as everybody's. */
export async function playReview(
  { comments = [], review }: DemoRevision,
  commandBy: (role: Role) => Command,
): Promise<void> {
  for (const { by, text, path } of comments) await addComment(commandBy(by), { text, path });
  if (!review) return;
  const { submitted, decided, withdrawn } = review;
  await submitRevision(commandBy(submitted.by), submitted);
  if (decided) await giveVerdict(commandBy(decided.by), unhindered, decided);
  if (withdrawn) await withdrawRevision(commandBy(withdrawn.by), unhindered, withdrawn);
}
