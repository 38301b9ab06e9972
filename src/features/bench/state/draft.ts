import type { z } from 'zod';
import {
  definitionSchema,
  levelSchema,
  tableSchema,
  type Definition,
} from '../../../../shared/contract/index.ts';

/**
 * Reads a draft: a definition in which numbers and lists may still be refused, for that is what a form holds while
 * someone types. Anything else that is wrong (a word for a number, an unknown kind, no source) makes it no draft,
 * and the answer is `null`.
 */
export function readDraft(input: unknown): Definition | null {
  const parsed = definitionSchema.safeParse(input);
  if (parsed.success) return parsed.data;
  if (!parsed.error.issues.every((issue) => isFaultOfSize(issue, input))) return null;
  // Every fault is in the size of something that is there, so the input has the definition's shape throughout.
  const draft = input as Definition;
  return {
    ...draft,
    level: { ...levelSchema.parse({}), ...draft.level },
    table: { ...tableSchema.parse({}), ...draft.table },
  };
}

function isFaultOfSize(issue: z.core.$ZodIssue, input: unknown): boolean {
  const found = issue.path.reduce(
    (here: unknown, step) => (here as Record<PropertyKey, unknown> | undefined)?.[step],
    input,
  );
  switch (issue.code) {
    case 'too_small':
    case 'too_big':
    case 'custom':
      return true;
    case 'invalid_type':
      return typeof found === 'number';
    case 'invalid_union':
      return issue.errors.some((branch) => branch.every((within) => isFaultOfSize(within, found)));
    default:
      return false;
  }
}
