import { commentsOfARevision, type Comment, type CreateComment } from '../../../shared/contract/index.ts';
import { appendEvent } from '../../audit/append-event.ts';
import { Problem } from '../../http/problem.ts';
import { authorsOf, hold, type Command } from './commands.ts';
import { presentComment } from './presenter.ts';
import { countComments, findCommenters } from './queries.ts';
import { insertComment } from './store.ts';

/** @throws {Problem} `conflict` where the revision has as many comments as it may */
export async function addComment(command: Command, { text, path }: CreateComment): Promise<Comment> {
  const { transaction, auditKey, scope, tell, slug, number } = command;
  const { row, stamp } = await hold(command, 'author');
  const { teamId, userId, at } = stamp;
  if ((await countComments(transaction, teamId, row.revisionId)) >= commentsOfARevision) {
    throw new Problem('conflict', {
      detail: `This revision has ${commentsOfARevision} comments, as many as one may.`,
    });
  }
  const commenterIds = await findCommenters(transaction, teamId, row.revisionId);
  const id = await insertComment(transaction, stamp, row, { text, path });
  const title = row.tableTitle;
  await tell({
    kind: 'comment',
    table: { slug, title },
    number,
    ...authorsOf(row),
    commenterIds,
    judgeIds: row.decidedById === null ? [] : [row.decidedById],
    text,
    path,
  });
  await appendEvent(transaction, auditKey, {
    teamId,
    actor: scope.user,
    action: 'comment.added',
    subject: `table:${slug}`,
    details: { title, number, path, text },
  });
  return presentComment({ id, writtenById: userId, writtenByName: scope.user.name, at, text, path });
}
