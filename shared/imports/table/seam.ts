/** How the loop closes: the step from its last entry to its first beside the largest step within. */
export interface Seam {
  /** Last entry to first, in units of the values, with its sign. */
  readonly step: number;
  /** Largest step between neighbours within, without sign. */
  readonly largestWithin: number;
  /** |step| as a share of the whole span from lowest to highest; 0 for a constant. */
  readonly stepShare: number;
}

export function seamOf(values: ArrayLike<number>): Seam {
  let lowest = values[0];
  let highest = values[0];
  let largestWithin = 0;
  for (let k = 1; k < values.length; k += 1) {
    lowest = Math.min(lowest, values[k]);
    highest = Math.max(highest, values[k]);
    largestWithin = Math.max(largestWithin, Math.abs(values[k] - values[k - 1]));
  }
  const step = values[0] - values[values.length - 1];
  return { step, largestWithin, stepShare: highest > lowest ? Math.abs(step) / (highest - lowest) : 0 };
}
