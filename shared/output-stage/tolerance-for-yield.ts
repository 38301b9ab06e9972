import { outputLimits, type Ladder, type TrialSettings } from '../contract/index.ts';
import { Trials } from './trials.ts';

/** Tolerances that resistors are marked with, in percent (IEC 60062). */
export const markedTolerances = [20, 10, 5, 2, 1, 0.5, 0.25, 0.1, 0.05, 0.02, 0.01, 0.005] as const;

export interface ToleranceForYield {
  /**
   * The widest tolerance that keeps the yield in these trials, in percent, to 1 part in 100; null where even the
   * ladder without tolerance does not rise.
   */
  readonly tolerancePercent: number | null;
  /** The widest marked tolerance that does; null where none does. */
  readonly markedPercent: number | null;
}

const widest = { uniform: 99, normal: outputLimits.normalTolerancePercent };

/**
 * The tolerance that a ladder needs so that a share of builds is monotonic. The same deviates serve every
 * tolerance, so that the search is over one population of ladders.
 *
 * @param share of builds that must be monotonic, 0…1
 */
export function toleranceForYield(
  ladder: Ladder,
  share: number,
  settings: Pick<TrialSettings, 'distribution' | 'seed' | 'trials'>,
): ToleranceForYield {
  const keeps = (tolerancePercent: number) =>
    keepsYield(new Trials(ladder, { ...settings, tolerancePercent }), share);
  const markedPercent =
    markedTolerances.find((tolerance) => tolerance <= widest[settings.distribution] && keeps(tolerance)) ??
    null;
  let low = markedPercent ?? 0;
  if (markedPercent === null && !keeps(0)) return { tolerancePercent: null, markedPercent };
  const above = markedTolerances.filter((tolerance) => tolerance > low);
  let high = above.length === 0 ? widest[settings.distribution] : above[above.length - 1];
  if (high > widest[settings.distribution]) high = widest[settings.distribution];
  if (keeps(high)) return { tolerancePercent: high, markedPercent };
  while (high - low > 0.01 * high && high > 1e-6) {
    const middle = (low + high) / 2;
    if (keeps(middle)) low = middle;
    else high = middle;
  }
  return { tolerancePercent: low, markedPercent };
}

/** Whether enough builds rise; stops as soon as it can be told. */
function keepsYield(trials: Trials, share: number): boolean {
  const needed = Math.ceil(share * trials.trials - 1e-9);
  let looked = 0;
  let rising = 0;
  while (!trials.isDone) {
    trials.run(64);
    const { monotonic } = trials.figures();
    for (; looked < monotonic.length; looked += 1) rising += monotonic[looked];
    if (rising + trials.trials - looked < needed) return false;
    if (rising >= needed) return true;
  }
  return rising >= needed;
}
