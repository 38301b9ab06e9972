import { sayProblem, type Refusal } from '../../shared/contract/index.ts';

/** Text on one line, with nothing that a terminal would act on: controls and turns of direction are shown as escapes. */
export const onOneLine = (text: string): string =>
  text.replace(
    /[\p{Cc}\p{Zl}\p{Zp}\u061c\u200e\u200f\u202a-\u202e\u2066-\u2069]/gu,
    (character) => `\\u{${(character.codePointAt(0) ?? 0).toString(16)}}`,
  );

/** A refusal on one line: its first problem, and how many more there are. */
export function sayRefusal({ problems }: Refusal): string {
  const more = problems.length - 1;
  return onOneLine(`${sayProblem(problems[0])}${more > 0 ? ` (and ${more} more)` : ''}`);
}
