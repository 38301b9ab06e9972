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
  /** No line that is not listed is stronger; 0 where all that there are, are listed. */
  readonly unlistedAmplitude: number;
}

/** More than any screen has columns. */
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
  if (all <= most) {
    const every = Array.from({ length: all }, (_, i) => ({ k: i + 1, amplitude: amplitudeOf(i + 1, lines) }));
    return listOf(every, lines, 0);
  }
  const sources = sourcesOf(lines);
  if (sources.length === 0) return listOf([], lines, 0);
  const threshold = thresholdFor(most, sources, lines);
  const found = linesFrom(threshold, sources, lines).sort((a, b) => b.amplitude - a.amplitude);
  // Counting takes an arcsine, telling a sine: where they part by a line at the edge, the weakest goes.
  const unlisted = found.length > most ? found[most].amplitude : threshold;
  return listOf(found.slice(0, most), lines, unlisted);
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

interface Line {
  readonly k: number;
  readonly amplitude: number;
}

function listOf(found: readonly Line[], lines: RoundLines, unlistedAmplitude: number): AccumulatorLines {
  const order = found
    .map(({ k, amplitude }) => ({ k, amplitude, bin: binOf(k, lines) }))
    .sort((a, b) => a.bin - b.bin);
  return {
    period: lines.period,
    bins: Float64Array.from(order, ({ bin }) => bin),
    amplitudes: Float64Array.from(order, ({ amplitude }) => amplitude),
    tableLines: Float64Array.from(order, ({ k }) => k),
    unlistedAmplitude,
  };
}

/** A table line r from which lines of the output come: the first at k = r, and its images, which only fall. */
interface LineSource {
  readonly r: number;
  /** Amplitude at k = r. */
  readonly first: number;
  /** Amplitude at k times `sin(πk/P)`: the same for all its images. */
  readonly scaled: number;
}

/** The table lines that are there at all. */
function sourcesOf(lines: RoundLines): LineSource[] {
  const sources: LineSource[] = [];
  for (let r = 1; r <= lines.base / 2; r += 1) {
    const first = amplitudeOf(r, lines);
    if (first > 0) sources.push({ r, first, scaled: first * Math.sin((Math.PI * r) / lines.period) });
  }
  return sources;
}

/** An amplitude that some lines, but no more than `most`, reach; found by halving its logarithm. */
function thresholdFor(most: number, sources: readonly LineSource[], lines: RoundLines): number {
  let high = 0;
  for (const { first } of sources) high = Math.max(high, first);
  let low = 0;
  for (let turn = 0; turn < 60; turn += 1) {
    const guess = low === 0 ? high / 16 : Math.sqrt(low * high);
    const count = countFrom(guess, most, sources, lines);
    if (count > most) low = guess;
    else high = guess;
    // A list that is nearly full will do.
    if (guess < 1e-300 || (count <= most && count >= 0.9 * most)) break;
  }
  return high;
}

/** How many lines have at least that amplitude; stops counting beyond `most`. */
function countFrom(
  amplitude: number,
  most: number,
  sources: readonly LineSource[],
  { period, base, repeats }: RoundLines,
): number {
  let count = 0;
  for (const { r, first, scaled } of sources) {
    if (count > most) break;
    if (first < amplitude) continue;
    const sine = scaled / amplitude;
    const last =
      repeats === 1 ? r : sine >= 1 ? period / 2 : Math.floor((period / Math.PI) * Math.asin(sine));
    // k = r, r + base, …, and k = base − r, 2·base − r, …, which for base/2 are the same.
    count += Math.floor((last - r) / base) + 1;
    if (2 * r !== base) count += Math.floor((last + r) / base);
  }
  return count;
}

function linesFrom(amplitude: number, sources: readonly LineSource[], lines: RoundLines): Line[] {
  const found: Line[] = [];
  for (const { r, first } of sources) {
    if (first < amplitude) continue;
    for (const start of 2 * r === lines.base ? [r] : [r, lines.base - r]) {
      for (let k = start; 2 * k <= lines.period; k += lines.base) {
        const each = amplitudeOf(k, lines);
        if (each < amplitude) break;
        found.push({ k, amplitude: each });
      }
    }
  }
  return found;
}
