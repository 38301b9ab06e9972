import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';
import { and, eq } from 'drizzle-orm';
import type { Request, Response } from 'express';
import { userOf } from '../auth/team-scope.ts';
import type { Database, Executor } from '../db/client.ts';
import { errno, errnoOf } from '../db/errors.ts';
import { idempotencyKeys } from '../db/schema/index.ts';
import { withTransaction } from '../db/transaction.ts';
import { Problem } from './problem.ts';

type Asked = Pick<Request, 'get' | 'method' | 'originalUrl' | 'body'>;

/** What a command answers, in a form that can be kept and sent again. */
export interface Answer {
  readonly status: number;
  readonly headers?: Readonly<Record<string, string>>;
  /** Plain JSON; left out, the answer has no body. */
  readonly body?: unknown;
}

/**
 * Runs a POST's command in one transaction and sends its answer. With an Idempotency-Key
 * (draft-ietf-httpapi-idempotency-key-header) the answer is kept in the same transaction: a repeated request gets it
 * again, and one that comes while the first is under way waits for it. Nothing is kept of a command that throws.
 * The route needs `requireUser` or `requireTeam`: keys belong to a person.
 *
 * @throws {Problem} `validation` (422) where the key came with another request before
 */
export async function answerOnce(
  request: Asked,
  response: Response,
  db: Database,
  command: (transaction: Executor) => Promise<Answer>,
): Promise<void> {
  const key = keyOf(request);
  const answer = await withTransaction(db, async (transaction) => {
    if (key === undefined) return command(transaction);
    const place = { userId: userOf(request).id, key, requestHash: hashOf(request) };
    const earlier = await claim(transaction, place);
    if (earlier) return earlier;
    const made = await command(transaction);
    await transaction
      .update(idempotencyKeys)
      .set({ status: made.status, headers: made.headers ?? {}, body: { json: made.body } })
      .where(rowOf(place));
    return made;
  });
  response.status(answer.status).set(answer.headers ?? {});
  if (answer.body === undefined) response.end();
  else response.json(answer.body);
}

interface Place {
  readonly userId: number;
  readonly key: string;
  readonly requestHash: string;
}

const rowOf = ({ userId, key }: Place) =>
  and(eq(idempotencyKeys.userId, userId), eq(idempotencyKeys.key, key));

/** Takes the key for this transaction, or answers what was kept under it. A second taker waits for the first's end. */
async function claim(transaction: Executor, place: Place): Promise<Answer | undefined> {
  try {
    await transaction.insert(idempotencyKeys).values(place);
    return undefined;
  } catch (error) {
    if (errnoOf(error) !== errno.duplicate) throw error;
  }
  const [kept] = await transaction.select().from(idempotencyKeys).where(rowOf(place));
  if (kept?.requestHash !== place.requestHash) {
    throw new Problem('validation', {
      errors: [{ path: 'Idempotency-Key', value: 'used before', allowed: 'a new key for each new request' }],
    });
  }
  return {
    status: kept.status ?? 200,
    headers: kept.headers as Record<string, string>,
    body: (kept.body as { json?: unknown }).json,
  };
}

/** A structured string as the draft has it, or the same without its quotes. */
function keyOf(request: Asked): string | undefined {
  const header = request.get('Idempotency-Key');
  if (header === undefined) return undefined;
  const key = /^"(.*)"$/.exec(header)?.[1] ?? header;
  if (/^[\x21-\x7e]{1,100}$/.test(key)) return key;
  throw new Problem('validation', {
    errors: [{ path: 'Idempotency-Key', value: 'not usable', allowed: '1 to 100 visible ASCII characters' }],
  });
}

const hashOf = (request: Asked): string =>
  createHash('sha256')
    .update(`${request.method} ${request.originalUrl}\n${canonicalize(request.body ?? null) ?? ''}`)
    .digest('hex');
