import type { Report } from '../contract/index.ts';

/** Error power up to which the codes count as exact. */
export const exactPower = 1e-24;

/** What a signal is like, whatever it is quantised to. */
export interface SignalFacts {
  readonly variance: number;
  readonly isConstant: boolean;
  /** Its strongest line `A_k`, k ≥ 1. */
  readonly strongest: number;
}

/** A constant's variance is rounding noise, that of a very small signal may come out as 0. */
export function isConstant(cycle: Float64Array, variance: number): boolean {
  return variance === 0 || cycle.every((r) => r === cycle[0]);
}

/**
 * Figures that set the error against the signal (§4).
 *
 * @param strongestAdded the error's strongest line, k ≥ 1
 */
export function againstSignal(
  signal: SignalFacts,
  errorVariance: number,
  strongestAdded: number,
): Pick<Report, 'exact' | 'snrDb' | 'unwantedDb'> {
  const exact = errorVariance <= exactPower;
  if (exact || signal.isConstant) return { exact, snrDb: null, unwantedDb: null };
  const ratio = strongestAdded / signal.strongest;
  return {
    exact,
    snrDb: 10 * Math.log10(signal.variance / errorVariance),
    unwantedDb: ratio > 0 && Number.isFinite(ratio) ? 20 * Math.log10(ratio) : null,
  };
}

/** The largest of a list but its first, which is DC. */
export function strongestOf(amplitudes: Float64Array): number {
  let strongest = 0;
  for (let k = 1; k < amplitudes.length; k += 1) if (amplitudes[k] > strongest) strongest = amplitudes[k];
  return strongest;
}
