import type { z } from 'zod';
import { problemsIn } from '../../shared/contract/index.ts';
import { ProblemError } from '../api/problem-error.ts';

/**
 * Checks what is about to be sent, so that the commonest slips cost no request.
 *
 * @throws {ProblemError} as the server would answer it
 */
export function requireAllowed(schema: z.ZodType, input: unknown): void {
  const { error } = schema.safeParse(input);
  if (error === undefined) return;
  throw new ProblemError({
    kind: 'validation',
    status: 422,
    message: 'Some values are not allowed.',
    problems: problemsIn(error.issues, input, 'body'),
  });
}
