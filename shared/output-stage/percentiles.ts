/** Nearest-rank percentile of values in rising order: the `⌈share·n⌉`-th; null where there are none. */
export function nearestRank(sorted: Float64Array, share: number): number | null {
  if (sorted.length === 0) return null;
  return sorted[Math.min(sorted.length, Math.max(1, Math.ceil(share * sorted.length))) - 1];
}

/** Values that exist, in rising order. */
export function sortedFigures(values: Float64Array): Float64Array {
  return values.filter((value) => !Number.isNaN(value)).sort();
}

export interface Histogram {
  /** Lower edge of the first column and upper edge of the last. */
  readonly from: number;
  readonly to: number;
  /** Values in each column; a value on an edge belongs to the column above it, the last edge to the last. */
  readonly counts: Uint32Array;
}

/** Counts values between the least and the most of them in columns of equal width. */
export function histogramOf(values: Float64Array, columns: number): Histogram {
  const sorted = sortedFigures(values);
  const counts = new Uint32Array(columns);
  const from = sorted.length === 0 ? 0 : sorted[0];
  const to = sorted.length === 0 ? 0 : sorted[sorted.length - 1];
  for (const value of sorted) {
    const column = to > from ? Math.floor(((value - from) / (to - from)) * columns) : 0;
    counts[Math.min(columns - 1, column)] += 1;
  }
  return { from, to, counts };
}
