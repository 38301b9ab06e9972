import type { WordType } from './word-type.ts';

/** How numbers are written in a target's language. */
export interface NumberStyle {
  readonly base: 'decimal' | 'hexadecimal';
  /** Numbers in a row; by their width where 0: 16 while they have at most four characters, else 8. */
  readonly columns: number;
  /** What a number begins with in hexadecimal. */
  readonly hexPrefix: string;
  /** Digits of a number in hexadecimal. */
  readonly hexDigits: number;
  /** Before each row, and after each number but the last of a row. */
  readonly indent: string;
  readonly separator: string;
  /** After the last number of each row but the last. */
  readonly rowEnd: string;
}

export const plainStyle: NumberStyle = {
  base: 'decimal',
  columns: 0,
  hexPrefix: '0x',
  hexDigits: 2,
  indent: '    ',
  separator: ', ',
  rowEnd: ',',
};

/** Values that texts are kept for: all of a table's, none of a wide port's. */
const mostKept = 2 ** 16;

/** Numbers in rows, right-aligned, so that an entry is found by its index. No line end follows the last. */
export function wordRows(words: ArrayLike<number>, style: NumberStyle = plainStyle): string {
  const { indent, separator, rowEnd } = style;
  const { min, max } = wordSpan(words);
  const width = Math.max(numberText(min, style).length, numberText(max, style).length);
  const columns = style.columns || (width <= 4 ? 16 : 8);
  // A value that comes again is written once: a table has at most 65,536 different ones.
  const kept: (string | undefined)[] = new Array(max - min < mostKept ? max - min + 1 : 0);
  let text = '';
  for (let k = 0; k < words.length; k += 1) {
    const known = kept[words[k] - min] ?? numberText(words[k], style).padStart(width);
    if (kept.length > 0) kept[words[k] - min] = known;
    if (k % columns !== 0) text += separator;
    else text += k === 0 ? indent : `${rowEnd}\n${indent}`;
    text += known;
  }
  return text;
}

function numberText(word: number, { base, hexPrefix, hexDigits }: NumberStyle): string {
  if (base === 'decimal') return String(word);
  const digits = Math.abs(word).toString(16).toUpperCase().padStart(hexDigits, '0');
  return `${word < 0 ? '-' : ''}${hexPrefix}${digits}`;
}

/** Smallest and largest of the words; a table has at least one. */
export function wordSpan(words: ArrayLike<number>): { min: number; max: number } {
  let min = words[0];
  let max = min;
  for (let k = 1; k < words.length; k += 1) {
    if (words[k] < min) min = words[k];
    if (words[k] > max) max = words[k];
  }
  return { min, max };
}

/** A word as a C constant that fits the word's own type where `int` has 16 bits: there, `-32768` would be long. */
export function wordLiteral(word: number, { signed }: Pick<WordType, 'signed'>): string {
  if (!signed) return `${word}u`;
  if (word === -32_768) return '(-32767 - 1)';
  return word < 0 ? `(${word})` : String(word);
}
