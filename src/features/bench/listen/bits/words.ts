import { offFromBottom, type BitMask } from '../../../../../shared/listening/index.ts';

/** The bits of a mask, lowest first. */
export function bitsOf(off: BitMask, bits: number): number[] {
  return Array.from({ length: bits }, (_, bit) => bit).filter((bit) => (off >> bit) % 2 === 1);
}

/** Which bits are off: `all bits on`, `bit 3 off`, `bits 0 to 4 off`, `bits 0, 2 and 5 off`, `all bits off`. */
export function sayBitsOff(off: BitMask, bits: number): string {
  const which = bitsOf(off, bits);
  if (which.length === 0) return 'all bits on';
  if (which.length === bits) return 'all bits off';
  if (which.length === 1) return `bit ${which[0]} off`;
  if (offFromBottom(off) === which.length && which.length > 2) return `bits 0 to ${which.length - 1} off`;
  return `bits ${which.slice(0, -1).join(', ')} and ${which[which.length - 1]} off`;
}
