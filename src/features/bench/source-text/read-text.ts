import {
  checkDefinition,
  findJsonFault,
  type Definition,
  type JsonFault,
  type Problem,
} from '../../../../shared/contract/index.ts';

/** What a text stands for: a definition, or why it is none. */
export type TextReading =
  | { readonly kind: 'definition'; readonly definition: Definition }
  | { readonly kind: 'no JSON'; readonly fault: JsonFault }
  | { readonly kind: 'refused'; readonly problems: readonly Problem[] };

export function readText(text: string): TextReading {
  const fault = findJsonFault(text);
  if (fault !== undefined) return { kind: 'no JSON', fault };
  const checked = checkDefinition(JSON.parse(text));
  return 'problems' in checked
    ? { kind: 'refused', problems: checked.problems }
    : { kind: 'definition', definition: checked.definition };
}

/** The one stretch that differs between two texts, so that the caret and the view stay where they are. */
export function changeBetween(
  before: string,
  after: string,
): { from: number; to: number; insert: string } | null {
  if (before === after) return null;
  const shorter = Math.min(before.length, after.length);
  let from = 0;
  while (from < shorter && before[from] === after[from]) from += 1;
  let behind = 0;
  while (behind < shorter - from && before.at(-1 - behind) === after.at(-1 - behind)) behind += 1;
  return { from, to: before.length - behind, insert: after.slice(from, after.length - behind) };
}
