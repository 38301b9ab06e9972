/** How far a converter is from a straight line (IEEE Std 1658-2011, JEDEC JESD99). */
export interface Linearity {
  /** Mean step between the end points, `(V(L−1) − V(0))/(L−1)`, in V. */
  readonly lsbVolts: number;
  /** `(V(c) − V(0))/LSBe − c` by code: off the line through the end points, in LSB. */
  readonly inl: Float64Array;
  /** `(V(c) − V(c−1))/LSBe − 1` by code, in LSB; code 0 has no step and stands as 0. */
  readonly dnl: Float64Array;
  /** Largest of absolute values. */
  readonly maxInl: number;
  readonly maxDnl: number;
  /** Whether every step goes up. */
  readonly monotonic: boolean;
}

/** Linearity of a converter from the voltage of each code, which must rise from first to last. */
export function linearityOf(volts: ArrayLike<number>): Linearity {
  const top = volts.length - 1;
  const inl = new Float64Array(volts.length);
  const dnl = new Float64Array(volts.length);
  const lsbVolts = (volts[top] - volts[0]) / top;
  let maxInl = 0;
  let maxDnl = 0;
  let monotonic = true;
  for (let code = 1; code <= top; code += 1) {
    const step = volts[code] - volts[code - 1];
    inl[code] = (volts[code] - volts[0]) / lsbVolts - code;
    dnl[code] = step / lsbVolts - 1;
    maxInl = Math.max(maxInl, Math.abs(inl[code]));
    maxDnl = Math.max(maxDnl, Math.abs(dnl[code]));
    if (!(step > 0)) monotonic = false;
  }
  return { lsbVolts, inl, dnl, maxInl, maxDnl, monotonic };
}
