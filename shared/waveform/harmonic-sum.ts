import { transformOf } from '../dft/index.ts';
import type { TableSettings } from '../contract/index.ts';
import { stepFraction } from './phases.ts';

/** One line of a sum: `sine·sin(2π·harmonic·t) + cosine·cos(2π·harmonic·t)`. */
export interface HarmonicLine {
  readonly harmonic: number;
  readonly sine: number;
  readonly cosine: number;
}

type Sampling = Pick<TableSettings, 'length' | 'cycles' | 'startPhaseDeg' | 'sampleAt'>;

/** Sine and cosine of one period in N steps, interleaved; kept for the last few lengths. */
const unitCircles = new Map<number, Float64Array>();
const unitCirclesKept = 16;

function unitCircle(length: number): Float64Array {
  const known = unitCircles.get(length);
  if (known !== undefined) return known;
  const circle = new Float64Array(2 * length);
  for (let j = 0; j < length; j += 1) {
    const angle = (2 * Math.PI * j) / length;
    circle[2 * j] = Math.sin(angle);
    circle[2 * j + 1] = Math.cos(angle);
  }
  if (unitCircles.size >= unitCirclesKept) unitCircles.delete(unitCircles.keys().next().value as number);
  unitCircles.set(length, circle);
  return circle;
}

/**
 * Adds a sum of harmonics, all below the table's Nyquist limit (`2·harmonic·K < N`), to `out` at the table's
 * phases. Entry k of harmonic n stands at angle `2π·(n·K·k mod N)/N` plus a constant: whole numbers under the
 * modulo keep long tables exact. Few harmonics are added one by one, many through one inverse DFT.
 */
export function addHarmonics(out: Float64Array, harmonics: readonly HarmonicLine[], table: Sampling): void {
  const isEven = table.length % 2 === 0;
  const size = isEven ? table.length / 2 : table.length;
  const isPowerOfTwo = (size & (size - 1)) === 0;
  // About what one transform costs, in harmonics added one by one.
  const oneTransform = Math.log2(table.length) * (isPowerOfTwo ? 0.6 : isEven ? 2 : 4);
  const lines = turnedToStart(harmonics, table);
  if (lines.length <= oneTransform) for (const line of lines) addOne(out, line, table);
  else if (isEven) addByHalfTransform(out, lines, table);
  else addByTransform(out, lines, table);
}

/** The same lines counted from the table's first entry. */
function turnedToStart(lines: readonly HarmonicLine[], table: Sampling): readonly HarmonicLine[] {
  const { length, cycles, startPhaseDeg } = table;
  const fraction = stepFraction(table);
  if (fraction === 0 && startPhaseDeg === 0) return lines;
  return lines.map(({ harmonic, sine, cosine }) => {
    const turns = (harmonic * fraction * cycles) / length + (harmonic * startPhaseDeg) / 360;
    const angle = 2 * Math.PI * (turns % 1);
    const c = Math.cos(angle);
    const s = Math.sin(angle);
    return { harmonic, sine: sine * c - cosine * s, cosine: sine * s + cosine * c };
  });
}

function addOne(
  out: Float64Array,
  { harmonic, sine, cosine }: HarmonicLine,
  { length, cycles }: Sampling,
): void {
  const unit = unitCircle(length);
  const step = (harmonic * cycles) % length;
  let at = 0;
  for (let k = 0; k < length; k += 1) {
    out[k] += sine * unit[2 * at] + cosine * unit[2 * at + 1];
    at += step;
    if (at >= length) at -= length;
  }
}

/** Conjugate coefficients under a forward transform give the conjugate of the wanted sum. */
function addByTransform(
  out: Float64Array,
  lines: readonly HarmonicLine[],
  { length, cycles }: Sampling,
): void {
  const { data, out: sum, forward } = transformOf(length);
  data.fill(0);
  for (const { harmonic, sine, cosine } of lines) {
    data[2 * harmonic * cycles] += cosine;
    data[2 * harmonic * cycles + 1] += sine;
  }
  forward(sum, data);
  for (let k = 0; k < length; k += 1) out[k] += sum[2 * k];
}

/**
 * For an even N by a transform of M = N/2: entries 2m and 2m+1 are real and imaginary part of `z_m`. A line
 * `H = (cosine − i·sine)/2` in bin b, its mirror image `conj H` in bin N−b, becomes `H·(1 + i·w)` in bin b of Z
 * and `conj(H·(1 − i·w))` in bin M−b, with `w = e^(2πi·b/N)`. Z goes in conjugated, z comes out conjugated.
 */
function addByHalfTransform(
  out: Float64Array,
  lines: readonly HarmonicLine[],
  { length, cycles }: Sampling,
): void {
  const half = length / 2;
  const unit = unitCircle(length);
  const { data, out: pairs, forward } = transformOf(half);
  data.fill(0);
  for (const { harmonic, sine, cosine } of lines) {
    const bin = harmonic * cycles;
    const s = unit[2 * bin];
    const c = unit[2 * bin + 1];
    const re = cosine / 2;
    const im = -sine / 2;
    // H·i·w = (re + i·im)·(−s + i·c)
    const turnedRe = -re * s - im * c;
    const turnedIm = re * c - im * s;
    data[2 * bin] += re + turnedRe;
    data[2 * bin + 1] -= im + turnedIm;
    data[2 * (half - bin)] += re - turnedRe;
    data[2 * (half - bin) + 1] += im - turnedIm;
  }
  forward(pairs, data);
  for (let m = 0; m < half; m += 1) {
    out[2 * m] += pairs[2 * m];
    out[2 * m + 1] -= pairs[2 * m + 1];
  }
}
