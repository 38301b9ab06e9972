import type { z } from 'zod';
import { definitionSchema, type Definition } from './definition.ts';
import { limits } from './limits.ts';
import { Refusal, showPath, showValue, type Problem } from './refusal.ts';
import { problemsOfRawSource } from './raw-source.ts';
import { brokenRules } from './rules.ts';

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
  const source = typeof input === 'object' && input !== null && 'source' in input ? input.source : undefined;
  const [hopeless, ...alike] = problemsOfRawSource(source);
  if (hopeless !== undefined) return { problems: [hopeless, ...alike] };
  const parsed = definitionSchema.safeParse(input);
  if (!parsed.success) {
    const [first, ...others] = problemsIn(parsed.error.issues, input);
    return { problems: [first, ...others] };
  }
  const [first, ...others] = brokenRules(parsed.data);
  return first === undefined ? { definition: parsed.data } : { problems: [first, ...others] };
}

/**
 * Issues of the schema library in our own words: one problem a field, the first, and not more than a reader can
 * use, as input can hold a million faults.
 *
 * @param whole what to call the input where it is at fault as a whole
 */
export function problemsIn(
  issues: readonly z.core.$ZodIssue[],
  input: unknown,
  whole = 'definition',
): Problem[] {
  const byPath = new Map<string, Problem>();
  for (const issue of issues) {
    for (const problem of problemsOf(issue, input, whole)) {
      if (!byPath.has(problem.path)) byPath.set(problem.path, problem);
      if (byPath.size === limits.problemsShown) return [...byPath.values()];
    }
  }
  return [...byPath.values()];
}

/** Turns an issue of the schema library into our own words. */
export function problemsOf(issue: z.core.$ZodIssue, input: unknown, whole = 'definition'): Problem[] {
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.slice(0, limits.problemsShown).map((key) => ({
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
