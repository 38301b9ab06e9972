import { binOf, checkAccumulator, type Accumulator } from './accumulator.ts';
import { amplitudeOf, imagePowerOf, roundLinesOf, tablePowerOf, type RoundLines } from './round-lines.ts';

/** Figures of a table played through a phase accumulator (§5). A figure that does not exist is `null`. */
export interface AccumulatorFigures {
  /** P: samples until the output repeats. Bins are in units of fs/P. */
  readonly period: number;
  /** The strongest line, DC left out (within 10⁻⁹ of each other: the lowest); `null` where there is no line. */
  readonly carrierBin: number | null;
  /** Of full scale, as it comes out; 0 where there is no line. */
  readonly carrierAmplitude: number;
  /** The strongest line besides DC and carrier, against the carrier. */
  readonly worstOtherDbc: number | null;
  readonly worstOtherBin: number | null;
  /** The strongest line k ≥ N/2, which truncating the phase adds; `null` where P ≤ N and it adds none. */
  readonly worstTruncationDbc: number | null;
  readonly worstTruncationBin: number | null;
  /** The carrier's power over that of all other lines, DC left out. */
  readonly snrDb: number | null;
}

/** As in the figures of a table's carrier (§4). */
const equalAmplitude = 1e-9;
const purePower = 1e-22;
const leastAmplitude = Math.sqrt(2 * purePower);
/** Of the strongest other lines, those within this share of each other count as equally strong. */
const equalShare = 1e-9;

/**
 * Period, carrier, worst other line and SNR of an accumulator, in closed form: exact for any period up to 2^48.
 *
 * @param values what the codes stand for, q, of a table of 2^p entries
 * @throws {Refusal} where the accumulator does not fit the table.
 */
export function analyseAccumulator(values: Float64Array, accumulator: Accumulator): AccumulatorFigures {
  checkAccumulator(values.length, accumulator);
  const lines = roundLinesOf(values, accumulator);
  const { period, base, repeats } = lines;
  const none: AccumulatorFigures = {
    period,
    carrierBin: null,
    carrierAmplitude: 0,
    worstOtherDbc: null,
    worstOtherBin: null,
    worstTruncationDbc: null,
    worstTruncationBin: null,
    snrDb: null,
  };
  const half = base / 2;
  const firsts = amplitudesOf(lines, (r) => r);
  const carrier = carrierOf(firsts, lines);
  if (carrier === null) return none;
  const carrierAmplitude = firsts[carrier];
  const found = { ...none, carrierBin: binOf(carrier, lines), carrierAmplitude };

  let rest = imagePowerOf(carrier, lines);
  for (let r = 1; r <= half; r += 1) if (r !== carrier) rest += tablePowerOf(r, lines);
  if (rest <= purePower) return found;

  // Of the lines that come from one table line the first, k = r, is the strongest; the next is k = N − r. At N/2 they
  // are one, and the next is 3N/2.
  const next = amplitudesOf(lines, (r) => base - r);
  const otherThan = (r: number) => r !== carrier;
  const strongestFirst = strongestOf(firsts, (r) => r, lines, otherThan);
  const carrierImage = carrier === half ? base + half : base - carrier;
  const hasImage = repeats > 1 && 2 * carrierImage <= period;
  const image = hasImage
    ? { amplitude: amplitudeOf(carrierImage, lines), bin: binOf(carrierImage, lines) }
    : null;
  const worstOther = strongerOf(strongestFirst, image);
  const worstTruncation =
    repeats > 1
      ? strongestOf(
          next,
          (r) => base - r,
          lines,
          (r) => r !== half || carrier !== half,
        )
      : null;
  const carrierPower = (carrierAmplitude * carrierAmplitude) / (2 * carrier === period ? 1 : 2);
  const dbc = (amplitude: number) => 20 * Math.log10(amplitude / carrierAmplitude);
  return {
    ...found,
    worstOtherDbc: worstOther && dbc(worstOther.amplitude),
    worstOtherBin: worstOther && worstOther.bin,
    worstTruncationDbc: worstTruncation && dbc(worstTruncation.amplitude),
    worstTruncationBin: worstTruncation && worstTruncation.bin,
    snrDb: 10 * Math.log10(carrierPower / rest),
  };
}

/** Amplitudes of one line for each table line r = 1…base/2; place 0, which is DC's, stays 0. */
function amplitudesOf(lines: RoundLines, kOf: (r: number) => number): Float64Array {
  const amplitudes = new Float64Array(lines.base / 2 + 1);
  for (let r = 1; r < amplitudes.length; r += 1) amplitudes[r] = amplitudeOf(kOf(r), lines);
  return amplitudes;
}

/** The strongest line; of equally strong ones that with the lowest bin. `null` where there is only rounding. */
function carrierOf(amplitudes: Float64Array, lines: RoundLines): number | null {
  let strongest = 0;
  for (let r = 1; r < amplitudes.length; r += 1) strongest = Math.max(strongest, amplitudes[r]);
  if (strongest <= leastAmplitude) return null;
  const enough = Math.max(strongest - equalAmplitude, leastAmplitude);
  let carrier = 0;
  for (let r = 1; r < amplitudes.length; r += 1) {
    if (amplitudes[r] < enough) continue;
    if (carrier === 0 || binOf(r, lines) < binOf(carrier, lines)) carrier = r;
  }
  return carrier;
}

interface Strongest {
  readonly amplitude: number;
  readonly bin: number;
}

/** The strongest of the table lines taken; of equally strong ones the lowest bin. `null` where all are 0. */
function strongestOf(
  amplitudes: Float64Array,
  kOf: (r: number) => number,
  lines: RoundLines,
  isTaken: (r: number) => boolean,
): Strongest | null {
  let amplitude = 0;
  for (let r = 1; r < amplitudes.length; r += 1) {
    if (isTaken(r) && amplitudes[r] > amplitude) amplitude = amplitudes[r];
  }
  if (amplitude === 0) return null;
  let bin = Infinity;
  for (let r = 1; r < amplitudes.length; r += 1) {
    if (isTaken(r) && amplitudes[r] >= amplitude * (1 - equalShare))
      bin = Math.min(bin, binOf(kOf(r), lines));
  }
  return { amplitude, bin };
}

/** The stronger of two; of equally strong ones the one with the lower bin. */
function strongerOf(a: Strongest | null, b: Strongest | null): Strongest | null {
  if (a === null || b === null) return a ?? b;
  if (Math.abs(a.amplitude - b.amplitude) <= equalShare * a.amplitude) return a.bin < b.bin ? a : b;
  return a.amplitude > b.amplitude ? a : b;
}
