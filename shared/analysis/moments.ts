/** Mean, spread and size of a signal. */
export interface Moments {
  readonly mean: number;
  /** Population variance, mean removed. */
  readonly variance: number;
  readonly rms: number;
  /** Largest absolute value. */
  readonly peak: number;
}

/**
 * Moments of a signal in two passes. Four sums run side by side, as each addition waits for the one before it; their
 * order is fixed, so that a signal has the same moments wherever they are asked for.
 */
export function momentsOf(signal: Float64Array): Moments {
  const count = signal.length;
  const inFours = count - (count % 4);
  const mean = sumOf(signal, inFours) / count;

  let a = 0;
  let b = 0;
  let c = 0;
  let d = 0;
  let lowest = signal[0];
  let highest = signal[0];
  for (let k = 0; k < inFours; k += 4) {
    const x0 = signal[k];
    const x1 = signal[k + 1];
    const x2 = signal[k + 2];
    const x3 = signal[k + 3];
    a += (x0 - mean) * (x0 - mean);
    b += (x1 - mean) * (x1 - mean);
    c += (x2 - mean) * (x2 - mean);
    d += (x3 - mean) * (x3 - mean);
    if (x0 > highest) highest = x0;
    if (x0 < lowest) lowest = x0;
    if (x1 > highest) highest = x1;
    if (x1 < lowest) lowest = x1;
    if (x2 > highest) highest = x2;
    if (x2 < lowest) lowest = x2;
    if (x3 > highest) highest = x3;
    if (x3 < lowest) lowest = x3;
  }
  for (let k = inFours; k < count; k += 1) {
    const x = signal[k];
    a += (x - mean) * (x - mean);
    if (x > highest) highest = x;
    if (x < lowest) lowest = x;
  }
  const variance = (a + b + (c + d)) / count;
  return {
    mean,
    variance,
    rms: Math.sqrt(variance + mean * mean),
    peak: Math.max(Math.abs(lowest), Math.abs(highest)),
  };
}

function sumOf(signal: Float64Array, inFours: number): number {
  let a = 0;
  let b = 0;
  let c = 0;
  let d = 0;
  for (let k = 0; k < inFours; k += 4) {
    a += signal[k];
    b += signal[k + 1];
    c += signal[k + 2];
    d += signal[k + 3];
  }
  for (let k = inFours; k < signal.length; k += 1) a += signal[k];
  return a + b + (c + d);
}
