import { Refusal, showValue } from '../contract/index.ts';

/** Bits that a word takes in packed storage. */
export type PackedBits = 4 | 12;

/**
 * Bits a word takes when packed: two words of at most 4 bits a byte, two of 9 to 12 in three bytes.
 *
 * @throws {Refusal} where packing would save nothing or has no form
 */
export function packedBitsOf(bits: number): PackedBits {
  if (bits <= 4) return 4;
  if (bits > 8 && bits <= 12) return 12;
  throw new Refusal({
    path: 'options.packed',
    value: `${showValue('yes')} with ${bits} bits`,
    allowed: '"yes" with 1 to 4 bits, or with 9 to 12; else "no"',
  });
}

/** Words packed from the lowest bit of the first byte on; what is left of the last byte is 0. */
export function packWords(words: Int32Array, bits: PackedBits): Int32Array {
  const bytes = new Int32Array(Math.ceil((words.length * bits) / 8));
  words.forEach((word, k) => {
    if (bits === 4) {
      bytes[k >> 1] |= (word & 0xf) << (4 * (k & 1));
      return;
    }
    const at = (k >> 1) * 3;
    if (k % 2 === 0) {
      bytes[at] = word & 0xff;
      bytes[at + 1] = (word >> 8) & 0xf;
    } else {
      bytes[at + 1] |= (word & 0xf) << 4;
      bytes[at + 2] = (word >> 4) & 0xff;
    }
  });
  return bytes;
}
