import { transformOf } from '../dft/index.ts';

/**
 * Frames behind an impulse response, `y_n = Σ h_k·x_{n−k}`, as many as there were; nothing is before the first. By
 * overlap-add, two stretches at a time in the real and the imaginary part of one transform.
 *
 * @param onStretch after each stretch, with the share that is done
 */
export function convolve(
  frames: Float32Array,
  impulse: Float32Array,
  onStretch: (share: number) => void = () => undefined,
): Float32Array<ArrayBuffer> {
  let size = 64;
  while (size < 2 * impulse.length) size *= 2;
  const stretch = size - impulse.length + 1;
  const gains = new Float64Array(2 * size);
  const { data, out, forward } = transformOf(size);
  data.fill(0);
  for (let k = 0; k < impulse.length; k += 1) data[2 * k] = impulse[k];
  forward(gains, data);

  const heard = new Float32Array(frames.length);
  // Sums of the two stretches under way and of what rings on behind them.
  const sums = new Float64Array(2 * stretch + size);
  for (let first = 0; first < frames.length; first += 2 * stretch) {
    data.fill(0);
    const second = first + stretch;
    for (let i = 0; i < stretch; i += 1) {
      data[2 * i] = first + i < frames.length ? frames[first + i] : 0;
      data[2 * i + 1] = second + i < frames.length ? frames[second + i] : 0;
    }
    forward(out, data);
    // Conjugated, the forward transform serves as the inverse: its real part is the first stretch, its negative
    // imaginary part the second.
    for (let k = 0; k < 2 * size; k += 2) {
      data[k] = out[k] * gains[k] - out[k + 1] * gains[k + 1];
      data[k + 1] = -(out[k] * gains[k + 1] + out[k + 1] * gains[k]);
    }
    forward(out, data);
    for (let i = 0; i < size; i += 1) {
      sums[i] += out[2 * i] / size;
      sums[stretch + i] -= out[2 * i + 1] / size;
    }
    const last = Math.min(frames.length, first + 2 * stretch);
    for (let i = first; i < last; i += 1) heard[i] = sums[i - first];
    sums.copyWithin(0, 2 * stretch);
    sums.fill(0, size);
    onStretch(last / frames.length);
  }
  return heard;
}
