/** Mean, spread and size of a signal. */
export interface Moments {
  readonly mean: number;
  /** Population variance, mean removed. */
  readonly variance: number;
  readonly rms: number;
  /** Largest absolute value. */
  readonly peak: number;
}

/** Moments of a cycle r, of the values q that its codes stand for, and of the error `q − r`, in two passes. */
export function momentsOf(
  cycle: Float64Array,
  values: Float64Array,
): { wanted: Moments; result: Moments; error: Moments } {
  const count = cycle.length;
  let wantedSum = 0;
  let resultSum = 0;
  let errorSum = 0;
  for (let k = 0; k < count; k += 1) {
    wantedSum += cycle[k];
    resultSum += values[k];
    errorSum += values[k] - cycle[k];
  }
  const wantedMean = wantedSum / count;
  const resultMean = resultSum / count;
  const errorMean = errorSum / count;

  let wantedSquares = 0;
  let resultSquares = 0;
  let errorSquares = 0;
  let wantedPeak = 0;
  let resultPeak = 0;
  let errorPeak = 0;
  for (let k = 0; k < count; k += 1) {
    const r = cycle[k];
    const q = values[k];
    wantedPeak = Math.max(wantedPeak, Math.abs(r));
    resultPeak = Math.max(resultPeak, Math.abs(q));
    errorPeak = Math.max(errorPeak, Math.abs(q - r));
    wantedSquares += (r - wantedMean) * (r - wantedMean);
    resultSquares += (q - resultMean) * (q - resultMean);
    errorSquares += (q - r - errorMean) * (q - r - errorMean);
  }
  return {
    wanted: momentsFrom(wantedMean, wantedSquares / count, wantedPeak),
    result: momentsFrom(resultMean, resultSquares / count, resultPeak),
    error: momentsFrom(errorMean, errorSquares / count, errorPeak),
  };
}

function momentsFrom(mean: number, variance: number, peak: number): Moments {
  return { mean, variance, rms: Math.sqrt(variance + mean * mean), peak };
}
