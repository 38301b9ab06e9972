import { plainText } from '../../text/plain-text.ts';

/** Characters of a term that count; a title has no more. */
const termLength = 63;

/** The words of a text as they are compared: runs of letters and digits without case and accents, each once. */
export const wordsOf = (text: string): string[] => [
  ...new Set((plainText(text).match(/[\p{L}\p{N}]+/gu) ?? []).map((word) => leading(word, termLength))),
];

/** A tag as a whole; no word begins like it. */
export const tagTerm = (tag: string): string => `#${tag}`;

/** Everything that a table is found by. */
export const termsOf = ({ title, tags }: { title: string; tags: readonly string[] }): string[] => [
  ...new Set([title, ...tags].flatMap(wordsOf)),
  ...tags.map(tagTerm),
];

/**
 * 128 bits in two halves, in the manner of a Bloom filter (Bloom 1970): each term sets a few. A row that lacks one of
 * the bits of what is looked for does not have it; one that has them all probably has.
 */
export interface Signature {
  readonly low: bigint;
  readonly high: bigint;
}

/**
 * The bits of terms, or of beginnings of words to look for: a beginning's bits are among those of each word that
 * begins so. They are stored: another rule here needs a migration that makes them anew.
 */
export function signatureOf(terms: readonly string[]): Signature {
  let low = 0n;
  let high = 0n;
  for (const part of terms.flatMap(partsOf)) {
    const position = hash(part) % 128;
    if (position < 64) low |= 1n << BigInt(position);
    else high |= 1n << BigInt(position - 64);
  }
  return { low, high };
}

/** Lengths of the beginnings that get a bit: with more, the bits of a row fill up; with fewer, they tell less apart. */
const beginnings = [1, 2, 3, 5];

const partsOf = (term: string): string[] => {
  if (term.startsWith('#')) return [term, `#${term}`];
  const length = Array.from(term).length;
  return beginnings.filter((count) => count <= length).map((count) => leading(term, count));
};

const leading = (text: string, count: number) => Array.from(text).slice(0, count).join('');

/** FNV-1a of 32 bits over UTF-16 units (Fowler, Noll, Vo), its bits then mixed: the low ones are used alone. */
function hash(text: string): number {
  let value = 0x811c9dc5;
  for (let k = 0; k < text.length; k += 1) value = Math.imul(value ^ text.charCodeAt(k), 0x01000193);
  value ^= value >>> 15;
  value = Math.imul(value, 0x2c1b3c6d);
  return (value ^ (value >>> 12)) >>> 0;
}
