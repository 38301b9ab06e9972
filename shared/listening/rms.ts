import type { RoundLines } from './lines.ts';

/** RMS of a wave told by its lines, `√(Σ|c_m|²/2)` (Parseval). */
export function rmsOfLines({ re, im }: RoundLines): number {
  let sum = 0;
  for (let m = 1; m < re.length; m += 1) sum += re[m] * re[m] + im[m] * im[m];
  return Math.sqrt(sum / 2);
}
