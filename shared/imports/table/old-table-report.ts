import { limits, Refusal } from '../../contract/index.ts';
import type { CodeArray } from '../code/code-array.ts';
import { harmonicModelOf, type HarmonicModel } from './harmonic-model.ts';
import { seamOf, type Seam } from './seam.ts';

/** Figures of a table as somebody left it, read from its entries alone. */
export interface OldTableReport {
  readonly length: number;
  /** Bits that the entries really take, low bits that never change left out. */
  readonly bits: number;
  /** Bits of the words that they are stored in. */
  readonly wordBits: number;
  /** Low bits that are 0 in every entry. */
  readonly idleLowBits: number;
  readonly minCode: number;
  readonly maxCode: number;
  readonly usedCodes: number;
  /** Codes of that many bits beyond the lowest and highest entry: range that the converter has and the table leaves. */
  readonly lostCodes: number;
  /** The last entry repeats the first, and the wave fits one entry less: each turn of the loop stands still once. */
  readonly repeatsFirst: boolean;
  /** Mean less the middle of the range, in LSB. */
  readonly dcLsb: number;
  /** In codes. */
  readonly seam: Seam;
  /** The table's best-fitting harmonics over what is left beside them; null where nothing is left, or nothing moves. */
  readonly snrDb: number | null;
  /** How many harmonics those are. */
  readonly harmonics: number;
}

/** A table as codes 0…2^bits − 1, whatever words it was stored in. */
export interface OldTable {
  readonly codes: Uint16Array;
  readonly bits: number;
  readonly idleLowBits: number;
  readonly isSigned: boolean;
  readonly wordBits: number;
}

/** What is left beside a table's harmonics counts as nothing below this, in codes squared: rounding of the transform. */
const noPower = 1e-18;

/**
 * Codes of an array: its idle low bits shifted out, signed words counted from the lowest code of their depth.
 *
 * @throws {Refusal} where it is no table: too short or long, or of more than 16 bits
 */
export function oldTableOf({ values, isSigned, wordBits }: CodeArray): OldTable {
  const { min, max } = limits.tableLength;
  if (values.length < min || values.length > max) {
    throw new Refusal({
      path: 'array',
      value: `${values.length} entries`,
      allowed: `${min} to ${max} entries`,
    });
  }
  let set = 0;
  let lowest = values[0];
  let highest = values[0];
  for (const value of values) {
    set |= value;
    lowest = Math.min(lowest, value);
    highest = Math.max(highest, value);
  }
  const idleLowBits = set === 0 ? 0 : 31 - Math.clz32(set & -set);
  const step = 2 ** idleLowBits;
  let bits = 1;
  const fits = () => {
    const [from, to] = isSigned ? [-(2 ** (bits - 1)), 2 ** (bits - 1) - 1] : [0, 2 ** bits - 1];
    return lowest / step >= from && highest / step <= to;
  };
  while (bits <= limits.bits.max && !fits()) bits += 1;
  if (bits > limits.bits.max) {
    throw new Refusal({
      path: 'array',
      value: `entries of ${bits} bits or more`,
      allowed: `at most ${limits.bits.max} bits`,
    });
  }
  const middle = isSigned ? 2 ** (bits - 1) : 0;
  const codes = Uint16Array.from(values, (value) => value / step + middle);
  return { codes, bits, idleLowBits, isSigned, wordBits };
}

/** What a table's entries tell about it. */
export function reportOldTable({ codes, bits, idleLowBits, wordBits }: OldTable): OldTableReport {
  const levels = 2 ** bits;
  const used = new Uint8Array(levels);
  let sum = 0;
  for (const code of codes) {
    used[code] = 1;
    sum += code;
  }
  const minCode = used.indexOf(1);
  const maxCode = used.lastIndexOf(1);
  const model = harmonicModelOf(codes);
  return {
    length: codes.length,
    bits,
    wordBits,
    idleLowBits,
    minCode,
    maxCode,
    usedCodes: used.reduce((count, one) => count + one, 0),
    lostCodes: levels - (maxCode - minCode + 1),
    repeatsFirst: repeatsFirst(codes, model),
    dcLsb: sum / codes.length - (levels - 1) / 2,
    seam: seamOf(codes),
    snrDb: snrDbOf(model),
    harmonics: model.count,
  };
}

const snrDbOf = ({ power, restPower, count }: HarmonicModel): number | null =>
  count === 0 || restPower <= noPower ? null : 10 * Math.log10(power / restPower);

/**
 * Whether a table was made as if its last entry were the first of the next cycle: then the two are equal, but for a
 * code where a rounding fell to the other side, and the entries before the last are told better by their harmonics
 * than all of them. A wave that moves less than a code from entry to entry keeps the secret.
 */
function repeatsFirst(codes: Uint16Array, whole: HarmonicModel): boolean {
  const last = codes.length - 1;
  if (codes.length < 8 || Math.abs(codes[last] - codes[0]) > 1) return false;
  return harmonicModelOf(codes.subarray(0, last)).cost < whole.cost;
}

/** The entries that make one cycle of a table. */
export const cycleOf = (codes: Uint16Array, { repeatsFirst: one }: Pick<OldTableReport, 'repeatsFirst'>) =>
  one ? codes.subarray(0, codes.length - 1) : codes;
