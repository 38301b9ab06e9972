/** Mean and spread of a signal. */
export interface Spread {
  readonly mean: number;
  /** Population variance, mean removed. */
  readonly variance: number;
  readonly rms: number;
}

/**
 * Mean and spread in two passes. Four sums run side by side, as each addition waits for the one before it; their order
 * is fixed, so that a signal has the same spread wherever it is asked for.
 */
export function spreadOf(signal: Float64Array): Spread {
  const count = signal.length;
  const inFours = count - (count % 4);
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
  for (let k = inFours; k < count; k += 1) a += signal[k];
  const mean = (a + b + (c + d)) / count;

  a = 0;
  b = 0;
  c = 0;
  d = 0;
  for (let k = 0; k < inFours; k += 4) {
    const x0 = signal[k] - mean;
    const x1 = signal[k + 1] - mean;
    const x2 = signal[k + 2] - mean;
    const x3 = signal[k + 3] - mean;
    a += x0 * x0;
    b += x1 * x1;
    c += x2 * x2;
    d += x3 * x3;
  }
  for (let k = inFours; k < count; k += 1) a += (signal[k] - mean) * (signal[k] - mean);
  const variance = (a + b + (c + d)) / count;
  return { mean, variance, rms: Math.sqrt(variance + mean * mean) };
}
