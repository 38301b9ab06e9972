import type { Problem } from '../../contract/index.ts';

/** An array of whole numbers as it stands in some source, in order. */
export interface CodeArray {
  readonly name: string;
  /** Where it begins, from 1; for an image its lowest record. */
  readonly line: number;
  /** As it is declared: `uint8_t`, `.byte`; empty for a bare list. */
  readonly typeName: string;
  /** Bits of one word: 8, 16 or 32. */
  readonly wordBits: number;
  readonly isSigned: boolean;
  /** As the type reads them. */
  readonly values: readonly number[];
  /** What a reader should know: entries filled in, numbers taken by their bits. */
  readonly notes: readonly string[];
}

/** An array that was found and cannot be taken, and why. */
export interface RefusedArray {
  readonly name: string;
  readonly line: number;
  readonly problem: Problem;
}

export interface FoundArrays {
  readonly arrays: readonly CodeArray[];
  readonly refused: readonly RefusedArray[];
}

/** A word's width and sign; sign undefined where the language leaves it open. */
export interface WordType {
  readonly typeName: string;
  readonly wordBits: number;
  readonly isSigned: boolean | undefined;
}

/** Widest words an array may have. */
export const widestWord = 32;

/** The numbers that a word of so many bits can be given: read with or without a sign. */
export const rangeOfWord = (bits: number) => ({ min: -(2 ** (bits - 1)), max: 2 ** bits - 1 });

/**
 * Numbers as a word of that type holds them: a compiler stores the low bits, so that 255 in a signed byte is −1.
 * Where the sign is open, one that no entry contradicts is taken.
 */
export function asStored(
  given: readonly number[],
  { wordBits, isSigned }: Pick<WordType, 'wordBits' | 'isSigned'>,
): { values: number[]; isSigned: boolean; notes: string[] } {
  const span = 2 ** wordBits;
  let hasNegative = false;
  let hasHigh = false;
  for (const value of given) {
    hasNegative ||= value < 0;
    hasHigh ||= value >= span / 2;
  }
  const signed = isSigned ?? (hasNegative && !hasHigh);
  const isTaken = signed ? hasHigh : hasNegative;
  if (!isTaken) return { values: [...given], isSigned: signed, notes: [] };
  const values = given.map((value) => {
    if (signed) return value >= span / 2 ? value - span : value;
    return value < 0 ? value + span : value;
  });
  const what = signed ? `Entries above ${span / 2 - 1}` : 'Entries below 0';
  const how = `with ${signed ? 'a' : 'no'} sign`;
  return {
    values,
    isSigned: signed,
    notes: [`${what} are read by their bits, as a word of ${wordBits} bits ${how} holds them.`],
  };
}

/** The smallest usual word that holds all of a bare list. */
export function wordFor(given: readonly number[]): number {
  let min = 0;
  let max = 0;
  for (const value of given) {
    min = Math.min(min, value);
    max = Math.max(max, value);
  }
  return (
    [8, 16].find((bits) => min >= -(2 ** (bits - 1)) && max < (min < 0 ? 2 ** (bits - 1) : 2 ** bits)) ?? 32
  );
}
