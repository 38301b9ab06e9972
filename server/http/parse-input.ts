import type { z } from 'zod';
import { problemsOf, type Problem as Fault } from '../../shared/contract/index.ts';
import { Problem } from './problem.ts';

/**
 * Parses what came in by its schema.
 *
 * @param whole what to call the input where it is at fault as a whole: `body`, `query`
 * @throws {Problem} `validation` (422), naming each field at fault, its value and what is allowed
 */
export function parseInput<Schema extends z.ZodType>(
  schema: Schema,
  input: unknown,
  whole = 'body',
): z.output<Schema> {
  const result = schema.safeParse(input);
  if (result.success) return result.data;
  const faults = result.error.issues.flatMap((issue) => problemsOf(issue, input, whole));
  throw new Problem('validation', { errors: faults.map(withoutSecret) });
}

/** An answer may be shown, kept or sent on: what was typed as a secret is not in it. */
const withoutSecret = (fault: Fault): Fault =>
  /password|token/i.test(fault.path) ? { ...fault, value: 'what was sent' } : fault;
