/** How measured levels lie against even ones between the same ends. */
export interface LevelsLook {
  readonly lowest: number;
  readonly highest: number;
  /** `(V(L−1) − V(0))/(L−1)` in volts: the mean step, LSBe of IEEE Std 1658-2011. */
  readonly stepVolts: number;
  /** `(V(c) − V(0))/LSBe − c` by code, in LSB; none where the ends are equal. */
  readonly offLsb: Float64Array | null;
  /** Code of the largest deviation. */
  readonly worstCode: number;
  /** Whether each step up in code is one up in voltage. */
  readonly isMonotonic: boolean;
}

/** @param volts voltages by code, at least 2 */
export function lookAtLevels(volts: readonly number[]): LevelsLook {
  let lowest = Infinity;
  let highest = -Infinity;
  let isMonotonic = true;
  for (let code = 0; code < volts.length; code += 1) {
    lowest = Math.min(lowest, volts[code]);
    highest = Math.max(highest, volts[code]);
    if (code > 0 && !(volts[code] > volts[code - 1])) isMonotonic = false;
  }
  const stepVolts = (volts[volts.length - 1] - volts[0]) / (volts.length - 1);
  if (!(Math.abs(stepVolts) > 0))
    return { lowest, highest, stepVolts, offLsb: null, worstCode: 0, isMonotonic };
  const offLsb = Float64Array.from(volts, (each, code) => (each - volts[0]) / stepVolts - code);
  let worstCode = 0;
  for (let code = 1; code < offLsb.length; code += 1)
    if (Math.abs(offLsb[code]) > Math.abs(offLsb[worstCode])) worstCode = code;
  return { lowest, highest, stepVolts, offLsb, worstCode, isMonotonic };
}
