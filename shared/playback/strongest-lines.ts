import { binOf, checkAccumulator, type Accumulator } from './accumulator.ts';
import { amplitudeOf, roundLinesOf, type RoundLines } from './round-lines.ts';

/** Lines of an accumulator's output for a plot of its spurs, in order of their bins. */
export interface AccumulatorLines {
  /** Samples of one round; bin b stands at `b·fs/period`. */
  readonly period: number;
  readonly bins: Float64Array;
  /** Of full scale; an amplitude-1 sine is 1. */
  readonly amplitudes: Float64Array;
  /** k of §5: from N/2 on a line of the truncated phase. */
  readonly tableLines: Float64Array;
  /** No line that is not listed is stronger; 0 where all are listed. */
  readonly unlistedAmplitude: number;
}

/** A longer list would outgrow whole-number products (`binOf`) long after any screen. */
const linesAtMost = 2 ** 16;

/**
 * The strongest lines, DC left out; all of them where there are no more than `limit`. With a long accumulator there
 * are 2^47, but each table line's images fall as 1/k, so that those above any amplitude can be counted and told.
 *
 * @param limit 1…65536
 * @throws {Refusal} where the accumulator does not fit the table.
 */
export function strongestLines(
  values: Float64Array,
  accumulator: Accumulator,
  limit: number,
): AccumulatorLines {
  checkAccumulator(values.length, accumulator);
  const lines = roundLinesOf(values, accumulator);
  const most = Math.min(limit, linesAtMost);
  const all = lines.period / 2;
  if (all <= most)
    return listOf(
      Float64Array.from({ length: all }, (_, i) => i + 1),
      lines,
      0,
    );

  const strongestFirst = tableLinesByStrength(lines);
  const threshold = thresholdFor(most, strongestFirst, lines);
  const found = linesFrom(threshold, strongestFirst, lines);
  // Counting takes an arcsine, telling a sine: where they part by a line at the edge, the weakest goes.
  const byStrength = found.sort((a, b) => amplitudeOf(b, lines) - amplitudeOf(a, lines));
  const unlisted = byStrength.length > most ? amplitudeOf(byStrength[most], lines) : threshold;
  return listOf(Float64Array.from(byStrength.slice(0, most)), lines, unlisted);
}

/** Amplitudes of the strongest listed line of each of `columns` equal parts of 0…fs/2; NaN where none is listed. */
export function strongestByColumn(
  { bins, amplitudes, period }: Pick<AccumulatorLines, 'bins' | 'amplitudes' | 'period'>,
  columns: number,
): Float64Array {
  const strongest = new Float64Array(columns).fill(NaN);
  for (let i = 0; i < bins.length; i += 1) {
    const column = Math.min(columns - 1, Math.floor((2 * bins[i] * columns) / period));
    if (!(strongest[column] >= amplitudes[i])) strongest[column] = amplitudes[i];
  }
  return strongest;
}

function listOf(ks: Float64Array, lines: RoundLines, unlistedAmplitude: number): AccumulatorLines {
  const order = Array.from(ks, (k) => ({ k, bin: binOf(k, lines) })).sort((a, b) => a.bin - b.bin);
  return {
    period: lines.period,
    bins: Float64Array.from(order, ({ bin }) => bin),
    amplitudes: Float64Array.from(order, ({ k }) => amplitudeOf(k, lines)),
    tableLines: Float64Array.from(order, ({ k }) => k),
    unlistedAmplitude,
  };
}

/** Table lines r = 1…base/2 by the amplitude with which they come out at k = r. */
function tableLinesByStrength(lines: RoundLines): Uint32Array {
  const strength = new Float64Array(lines.base / 2 + 1);
  for (let r = 1; r < strength.length; r += 1) strength[r] = amplitudeOf(r, lines);
  return Uint32Array.from({ length: lines.base / 2 }, (_, i) => i + 1).sort(
    (a, b) => strength[b] - strength[a] || a - b,
  );
}

/** An amplitude that some lines, but no more than `most`, reach. */
function thresholdFor(most: number, strongestFirst: Uint32Array, lines: RoundLines): number {
  let high = amplitudeOf(strongestFirst[0], lines);
  let low = 0;
  // Halved as logarithms while low is unknown; 60 halvings fill a double.
  for (let turn = 0; turn < 60; turn += 1) {
    const guess = low === 0 ? high / 16 : Math.sqrt(low * high);
    if (guess <= 1e-300) break;
    if (countFrom(guess, most, strongestFirst, lines) <= most) high = guess;
    else low = guess;
  }
  return high;
}

/** How many lines have at least that amplitude; stops counting beyond `most`. */
function countFrom(amplitude: number, most: number, strongestFirst: Uint32Array, lines: RoundLines): number {
  let count = 0;
  for (const r of strongestFirst) {
    if (amplitudeOf(r, lines) < amplitude) break;
    const last = lastLineFrom(amplitude, r, lines);
    // k = r, r + base, …, and k = base − r, 2·base − r, …, which for base/2 are the same.
    count += Math.floor((last - r) / lines.base) + 1;
    if (2 * r !== lines.base) count += Math.floor((last + r) / lines.base);
    if (count > most) break;
  }
  return count;
}

/** The highest k at which an image of table line r could still have that amplitude. */
function lastLineFrom(amplitude: number, r: number, lines: RoundLines): number {
  const { period, base, repeats, tableAmplitudes } = lines;
  if (repeats === 1) return r;
  const sine = (tableAmplitudes[r] * Math.sin((Math.PI * r) / base)) / (repeats * amplitude);
  return sine >= 1 ? period / 2 : Math.floor((period / Math.PI) * Math.asin(sine));
}

function linesFrom(amplitude: number, strongestFirst: Uint32Array, lines: RoundLines): number[] {
  const found: number[] = [];
  for (const r of strongestFirst) {
    if (amplitudeOf(r, lines) < amplitude) break;
    const steps = 2 * r === lines.base ? [r] : [r, lines.base - r];
    for (const start of steps) {
      for (let k = start; 2 * k <= lines.period && amplitudeOf(k, lines) >= amplitude; k += lines.base) {
        found.push(k);
      }
    }
  }
  return found;
}
