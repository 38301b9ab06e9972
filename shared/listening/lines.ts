import { linesOf } from '../dft/index.ts';

/**
 * A periodic wave by its lines: `y(φ) = Re Σ (re[m] + i·im[m])·e^(2πimφ)`, m = 1…highest, φ in rounds of the table.
 * Place 0 is not used: there is no mean.
 */
export interface RoundLines {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** Complex gain at a frequency in Hz, written to out[0] (real part) and out[1] (imaginary part). */
export type Response = (hz: number, out: Float64Array) => void;

export const highestOf = (lines: RoundLines): number => lines.re.length - 1;

/** `lines[0 … highest]`, all of them 0. */
export function noLines(highest: number): RoundLines {
  return { re: new Float64Array(highest + 1), im: new Float64Array(highest + 1) };
}

/**
 * The smooth curve through N entries: the trigonometric polynomial `(2/N)·Re Σ X_m·e^(2πimφ)`, the line at N/2 with half
 * that weight. With every line kept it passes through the entries, less their mean, entry k at φ = k/N.
 *
 * @param highest no line above it is kept; the answer ends at min(⌊N/2⌋, highest)
 */
export function curveLines(values: Float64Array, highest: number): RoundLines {
  const size = values.length;
  const lines = noLines(Math.min(Math.floor(size / 2), highest));
  const { re, im } = linesOf(values);
  for (let m = 1; m < lines.re.length; m += 1) {
    const weight = (2 * m === size ? 1 : 2) / size;
    lines.re[m] = weight * re[m];
    lines.im[m] = weight * im[m];
  }
  return lines;
}

/**
 * The staircase that holds entry k from φ = k/N to (k+1)/N: `c_m = 2·X_{m mod N}/N · sin(πm/N)/(πm/N) · e^(−iπm/N)`,
 * images and N/2 included (engine specification §5, there without phases).
 *
 * @param highest the answer has all lines up to this one
 */
export function staircaseLines(values: Float64Array, highest: number): RoundLines {
  const size = values.length;
  const lines = noLines(highest);
  const { re, im } = linesOf(values);
  for (let m = 1; m <= highest; m += 1) {
    const bin = m % size;
    // A multiple of the sample rate is a zero of the hold, to the last bit.
    if (bin === 0) continue;
    const isMirrored = 2 * bin > size;
    const line = isMirrored ? size - bin : bin;
    const lineIm = isMirrored ? -im[line] : im[line];
    // sin(πm/N)·e^(−iπm/N) has the period N in m: from the remainder it keeps its last bits.
    const angle = (Math.PI * bin) / size;
    const sine = Math.sin(angle);
    const weight = (2 * sine) / (Math.PI * m);
    const turnRe = Math.cos(angle) * weight;
    const turnIm = -sine * weight;
    lines.re[m] = re[line] * turnRe - lineIm * turnIm;
    lines.im[m] = re[line] * turnIm + lineIm * turnRe;
  }
  return lines;
}

/** The same wave behind a response, line m at m·roundHz. */
export function throughResponse(lines: RoundLines, roundHz: number, response: Response): RoundLines {
  const behind = noLines(highestOf(lines));
  const gain = new Float64Array(2);
  for (let m = 1; m < behind.re.length; m += 1) {
    response(m * roundHz, gain);
    behind.re[m] = lines.re[m] * gain[0] - lines.im[m] * gain[1];
    behind.im[m] = lines.re[m] * gain[1] + lines.im[m] * gain[0];
  }
  return behind;
}

/** Number of the highest line below half of the context's rate; 0 where none is. */
export function highestBelow(contextRateHz: number, roundHz: number): number {
  return Math.max(0, Math.ceil(contextRateHz / 2 / roundHz) - 1);
}
