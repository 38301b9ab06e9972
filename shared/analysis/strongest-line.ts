import { realTransformOf } from '../dft/index.ts';

/**
 * The strongest line `A_k`, k ≥ 1, of a signal of even length: the same number, to the last bit, as the largest entry
 * of its amplitudes in `spectrumOf`, with one root instead of one a line.
 */
export function strongestLineOf(signal: Float64Array): number {
  const size = signal.length;
  const { lines, forward } = realTransformOf(size);
  forward(lines, signal);
  let strongest = 0;
  for (let i = 2; i < size; i += 2) {
    const power = lines[i] * lines[i] + lines[i + 1] * lines[i + 1];
    if (power > strongest) strongest = power;
  }
  const scale = 2 / size;
  const atHalf = (Math.abs(lines[size]) * scale) / 2;
  return Math.max(Math.sqrt(strongest) * scale, atHalf);
}
