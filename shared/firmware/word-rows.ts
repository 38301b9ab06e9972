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

/** Numbers in rows, right-aligned, so that an entry is found by its index. No line end follows the last. */
export function wordRows(words: ArrayLike<number>, style: NumberStyle = plainStyle): string {
  const { indent, separator, rowEnd } = style;
  const texts = new Array<string>(words.length);
  const known = new Map<number, string>();
  let width = 1;
  for (let k = 0; k < words.length; k += 1) {
    let text = known.get(words[k]);
    if (text === undefined) {
      text = numberText(words[k], style);
      known.set(words[k], text);
      width = Math.max(width, text.length);
    }
    texts[k] = text;
  }
  const padded = new Map(Array.from(known.values(), (text) => [text, text.padStart(width)]));
  const columns = style.columns || (width <= 4 ? 16 : 8);
  const rows: string[] = [];
  for (let start = 0; start < texts.length; start += columns) {
    const row = texts.slice(start, start + columns).map((text) => padded.get(text));
    rows.push(indent + row.join(separator));
  }
  return rows.join(`${rowEnd}\n`);
}

function numberText(word: number, { base, hexPrefix, hexDigits }: NumberStyle): string {
  if (base === 'decimal') return String(word);
  const digits = Math.abs(word).toString(16).toUpperCase().padStart(hexDigits, '0');
  return `${word < 0 ? '-' : ''}${hexPrefix}${digits}`;
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
