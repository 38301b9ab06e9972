import { Refusal, type TableSettings } from '../contract/index.ts';
import { levelsOf } from './scaling.ts';

type Coding = Pick<TableSettings, 'bits' | 'coding' | 'complement' | 'fold'>;

/**
 * Stored words of codes (§3.6): complement first, then coding; of a folded table the first quarter.
 *
 * @returns words 0…L−1, or −L/2…L/2−1 in two's complement.
 * @throws {Refusal} where a fold is asked for and the codes do not have its symmetry.
 */
export function storedWords(codes: Uint16Array, { bits, coding, complement, fold }: Coding): Int32Array {
  const levels = levelsOf(bits);
  if (fold === 'quarter') refuseUnfoldable(codes, levels - 1);
  const count = fold === 'quarter' ? codes.length / 4 : codes.length;
  const shift = coding === 'twos-complement' ? levels / 2 : 0;
  const words = new Int32Array(count);
  if (complement) for (let k = 0; k < count; k += 1) words[k] = levels - 1 - shift - codes[k];
  else if (shift !== 0) for (let k = 0; k < count; k += 1) words[k] = codes[k] - shift;
  else words.set(codes.subarray(0, count));
  return words;
}

/** Bytes that a table takes: one a word up to 8 bits, else two. */
export function tableBytesOf(wordCount: number, bits: number): number {
  return wordCount * (bits <= 8 ? 1 : 2);
}

function refuseUnfoldable(codes: Uint16Array, topCode: number): void {
  const half = codes.length / 2;
  for (let k = 0; k < half / 2; k += 1) {
    if (codes[half - 1 - k] !== codes[k]) refuse(half - 1 - k, codes, `code ${codes[k]}, that of entry ${k}`);
  }
  for (let k = 0; k < half; k += 1) {
    const mirrored = topCode - codes[k];
    if (codes[half + k] !== mirrored) refuse(half + k, codes, `code ${mirrored}, entry ${k} upside down`);
  }
}

function refuse(entry: number, codes: Uint16Array, allowed: string): never {
  throw new Refusal({
    path: 'table.fold',
    value: `"quarter" with code ${codes[entry]} at entry ${entry}`,
    allowed: `${allowed}, there; or "none"`,
  });
}
