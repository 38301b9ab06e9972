/** Controls, line ends, joiners and marks, all that turns the direction of writing, halves of pairs, and tags. */
const unseen: readonly (readonly [from: number, to: number])[] = [
  [0x00, 0x1f],
  [0x7f, 0x9f],
  [0xad, 0xad],
  [0x61c, 0x61c],
  [0x180e, 0x180e],
  [0x200b, 0x200f],
  [0x2028, 0x202e],
  [0x2060, 0x206f],
  [0xd800, 0xdfff],
  [0xfeff, 0xfeff],
  [0xfff0, 0xffff],
  [0xe0000, 0xe0fff],
];

const isUnseen = (codePoint: number) => unseen.some(([from, to]) => codePoint >= from && codePoint <= to);

/**
 * What a person typed, as it may stand in a comment of any target's language: it cannot end or open a comment, splice
 * lines, form a trigraph (C17 §5.2.1.1), hold what begins another (MISRA C:2012 rule 3.1), break the line or hide
 * what follows. What cannot stay becomes a space, a
 * backslash a slash, and a space parts the pairs that mean something; nothing else changes.
 */
export function inertText(text: string): string {
  return Array.from(text, (character) => (isUnseen(character.codePointAt(0) ?? 0) ? ' ' : character))
    .join('')
    .replaceAll('\\', '/')
    .replace(/\*(?=\/)|\/(?=[*/])|\?(?=\?)/g, '$& ')
    .trim();
}
