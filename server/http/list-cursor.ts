import { createHash } from 'node:crypto';
import { z } from 'zod';
import { Problem } from './problem.ts';

/** Where a page ends: the last row's place in the order. */
const positionSchema = z.tuple([z.string(), z.union([z.string(), z.number(), z.null()]), z.int().positive()]);

export interface Position {
  readonly key: string | number | null;
  readonly id: number;
}

/** Stands for what a list was asked for: a cursor is good for that and nothing else. */
const fingerprint = (question: readonly unknown[]) =>
  createHash('sha256').update(JSON.stringify(question)).digest('base64url').slice(0, 16);

export const writeCursor = (question: readonly unknown[], { key, id }: Position): string =>
  Buffer.from(JSON.stringify([fingerprint(question), key, id])).toString('base64url');

/** @throws {Problem} `validation` (422) where the cursor was not made for this question */
export function readCursor(question: readonly unknown[], cursor: string): Position {
  const parsed = positionSchema.safeParse(parseJson(Buffer.from(cursor, 'base64url').toString()));
  if (parsed.success && parsed.data[0] === fingerprint(question)) {
    return { key: parsed.data[1], id: parsed.data[2] };
  }
  throw new Problem('validation', {
    errors: [
      {
        path: 'cursor',
        value: 'not usable here',
        allowed: 'a nextCursor of the same list, filters and order',
      },
    ],
  });
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}
