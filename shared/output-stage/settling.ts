export interface Settling {
  /** `Rout·C`, in s. */
  readonly tauS: number;
  /** Until a full-scale step is within ½ LSB: `τ·ln(2^(b+1))`, in s. */
  readonly halfLsbS: number;
}

/** Settling of a first-order output (engine specification §6). */
export function settlingOf(outputOhms: number, capacitanceF: number, bits: number): Settling {
  const tauS = outputOhms * capacitanceF;
  return { tauS, halfLsbS: tauS * (bits + 1) * Math.LN2 };
}

/** Highest frequency at which a sine of peak Vp keeps within the slew rate: `SR/(2πVp)`, in Hz. */
export function fullPowerBandwidthHz(slewRateVPerS: number, peakVolts: number): number {
  return slewRateVPerS / (2 * Math.PI * peakVolts);
}

/** How long a step takes at the slew rate, in s. */
export function slewTimeS(stepVolts: number, slewRateVPerS: number): number {
  return Math.abs(stepVolts) / slewRateVPerS;
}

export interface TableStep {
  /** Entry from which the step goes on to the next, the last to the first. */
  readonly index: number;
  readonly from: number;
  readonly to: number;
  /** In V, up positive. */
  readonly volts: number;
}

/** The largest step of a loop, seam included; the lowest index of equal ones. */
export function largestStepOf(volts: ArrayLike<number>, codes: ArrayLike<number>): TableStep {
  let largest: TableStep = { index: 0, from: codes[0], to: codes[0], volts: 0 };
  for (let index = 0; index < codes.length; index += 1) {
    const from = codes[index];
    const to = codes[index + 1 === codes.length ? 0 : index + 1];
    const step = volts[to] - volts[from];
    if (Math.abs(step) > Math.abs(largest.volts) || index === 0) largest = { index, from, to, volts: step };
  }
  return largest;
}
