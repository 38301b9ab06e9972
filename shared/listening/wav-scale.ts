/** Bits of a sample, and whether it is a floating-point number. */
export type WavDepth = '8' | '16' | '24' | '32f';

/**
 * What ±1 becomes in a file: the largest code, 127, 32,767 or 8,388,607; with dither one less, so that its swing of up to
 * one code stays within. Floating-point samples are the frames themselves.
 */
export function fullScaleCode(depth: WavDepth, isDithered: boolean): number {
  return depth === '32f' ? 1 : 2 ** (Number(depth) - 1) - (isDithered ? 2 : 1);
}

/** The same in dBFS, of which 0 are 2^(bits − 1) codes: what other programs say of a full-scale peak. */
export function fullScaleDbfs(depth: WavDepth, isDithered: boolean): number {
  return depth === '32f' ? 0 : 20 * Math.log10(fullScaleCode(depth, isDithered) / 2 ** (Number(depth) - 1));
}
