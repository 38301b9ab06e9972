/** One-sided spectra of a table of N entries, bins 0…⌊N/2⌋ (engine specification §4). */
export interface Spectrum {
  /** `A_k` of what the codes stand for; an amplitude-1 sine is 1. */
  readonly amplitudes: Float64Array;
  /** Phase of bin k in degrees of a sine, −180 < φ ≤ 180. */
  readonly phasesDeg: Float64Array;
  /** `A_k` of the levelled cycle: what was intended. */
  readonly intended: Float64Array;
  /** `A_k` of the error: what quantising added. */
  readonly added: Float64Array;
}
