/** The sizes that a search goes through: each length with each depth. */
export interface SizeAxes {
  readonly lengths: readonly number[];
  readonly bits: readonly number[];
}

/** Powers of two from 16 to 8192, and every depth. */
export const usualAxes: SizeAxes = {
  lengths: Array.from({ length: 10 }, (_, i) => 16 * 2 ** i),
  bits: Array.from({ length: 16 }, (_, i) => i + 1),
};
