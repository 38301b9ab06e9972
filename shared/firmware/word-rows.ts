import type { WordType } from './word-type.ts';

/**
 * Words in decimal, right-aligned, a comma behind each but the last: 16 to a row while they have at most three
 * characters, else 8, so that an entry is found by its index. Rows are indented by four spaces; no line end follows.
 */
export function wordRows(words: Int32Array): string {
  let width = 1;
  for (const word of words) width = Math.max(width, String(word).length);
  const columns = width <= 3 ? 16 : 8;
  const rows: string[] = [];
  for (let start = 0; start < words.length; start += columns) {
    const row = Array.from(words.subarray(start, start + columns), (word) => String(word).padStart(width));
    rows.push(`    ${row.join(', ')}`);
  }
  return rows.join(',\n');
}

/** Smallest and largest of the words; a table has at least one. */
export function wordSpan(words: Int32Array): { min: number; max: number } {
  let [min] = words;
  let max = min;
  for (const word of words) {
    if (word < min) min = word;
    if (word > max) max = word;
  }
  return { min, max };
}

/** A word as a C constant that fits the word's own type where `int` has 16 bits: there, `-32768` would be long. */
export function wordLiteral(word: number, { signed }: Pick<WordType, 'signed'>): string {
  if (!signed) return `${word}u`;
  if (word === -32_768) return '(-32767 - 1)';
  return word < 0 ? `(${word})` : String(word);
}
