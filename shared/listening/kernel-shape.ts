/** Zero to zero of the low-pass under which edges are turned into frames, each side of its middle, in frames. */
export const kernelReach = 40;

/** Coefficients of each polynomial: degree 8, whose error at half the rate is 3·10⁻⁷ (−130 dB). */
export const kernelTerms = 9;

/** Frames by which what `PinPlayer` gives lags behind the pin. `RoundReader` waits for as long. */
export const pinDelayFrames = kernelReach - 1;

/** How one edge of a pin sounds at a context's rate (step-kernel.ts). Plain data, to be handed to the audio thread. */
export interface StepKernel {
  /** Frames over which an edge rises. */
  readonly taps: number;
  /** `kernelTerms` for each frame: rise in frame j of an edge at (u+1)/2 of a frame, as a polynomial in u, −1 ≤ u < 1. */
  readonly terms: Float64Array;
  /**
   * f of three sections in a row, `s_n = u_n + f[0]·s_{n−1}`, `t_n = s_n + f[1]·t_{n−1}` and
   * `y_n = t_n + f[2]·y_{n−1} + f[3]·y_{n−2}`; zeros where there is nothing behind the pin.
   */
  readonly feedback: Float64Array;
}

/** What an edge of 1 rises to before the sections, so that it is 1 behind them. */
export function finalOf([f0, f1, f2, f3]: Float64Array): number {
  return (1 - f0) * (1 - f1) * (1 - f2 - f3);
}
