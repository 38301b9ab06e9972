import { z } from 'zod';
import { definitionSchema, type Definition } from './definition.ts';
import { limits } from './limits.ts';
import { Refusal, showPath, showValue, type Problem } from './refusal.ts';
import { brokenRules, mixDepthOf } from './rules.ts';

// Zod tries `new Function` once to see whether it may; a page's security policy would report that.
z.config({ jitless: true });

/**
 * Parses anything into a definition with its defaults filled in.
 *
 * @throws {Refusal} naming each field at fault, its value and what is allowed.
 */
export function parseDefinition(input: unknown): Definition {
  const result = checkDefinition(input);
  if ('problems' in result) throw new Refusal(...result.problems);
  return result.definition;
}

/** The same without throwing: a form shows the problems beside their fields. */
export function checkDefinition(
  input: unknown,
): { definition: Definition } | { problems: [Problem, ...Problem[]] } {
  if (typeof input === 'object' && input !== null && 'source' in input && mixDepthOf(input.source) > limits.mixDepth) {
    return {
      problems: [
        { path: 'source', value: 'a deeper mix', allowed: `mixes nested at most ${limits.mixDepth} deep` },
      ],
    };
  }
  const parsed = definitionSchema.safeParse(input);
  if (!parsed.success) {
    const [first, ...others] = parsed.error.issues.flatMap((issue) => problemsOf(issue, input));
    return { problems: [first, ...others] };
  }
  const [first, ...others] = brokenRules(parsed.data);
  return first === undefined ? { definition: parsed.data } : { problems: [first, ...others] };
}

/** Turns an issue of the schema library into our own words. */
export function problemsOf(issue: z.core.$ZodIssue, input: unknown, whole = 'definition'): Problem[] {
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((key) => ({
      path: showPath([...issue.path, key], whole),
      value: showValue(valueAt(input, [...issue.path, key])),
      allowed: 'no such field',
    }));
  }
  // A literal's or union's branch errors say less than the field itself; only its own text is shown.
  const generic = issue.message.startsWith('Invalid input');
  const allowed = generic && issue.code === 'invalid_type' ? `an ${issue.expected}` : issue.message;
  return [{ path: showPath(issue.path, whole), value: showValue(valueAt(input, issue.path)), allowed }];
}

function valueAt(input: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>(
    (here, step) =>
      typeof here === 'object' && here !== null ? (here as Record<PropertyKey, unknown>)[step] : undefined,
    input,
  );
}
