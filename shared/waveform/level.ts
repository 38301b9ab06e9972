import {
  Refusal,
  type Definition,
  type LevelSettings,
  type Transfer,
  type Warning,
} from '../contract/index.ts';
import type { Synthesis } from './synthesise.ts';

/** A levelled cycle `r`: in −1…1 (bipolar) or 0…1 (unipolar), clipped there. */
export interface LevelledCycle {
  readonly cycle: Float64Array;
  /** Samples that left the range by more than 10⁻¹² before they were clipped. */
  readonly clippedSamples: number;
  readonly warnings: readonly Warning[];
}

/** What divides must exceed this fraction of the source's largest input, else the signal counts as zero. */
const zeroFraction = 1e-12;
const clipTolerance = 1e-12;

/**
 * Level of §3.1: mean, normalisation, level, transfer, clip. Takes the synthesis over: its array becomes the
 * levelled cycle.
 *
 * @throws {Refusal} where the signal is zero (or, for `span`, constant), or grows beyond what a double holds.
 */
export function levelCycle(synthesis: Synthesis, { level, table }: Definition): LevelledCycle {
  const isBipolar = table.range === 'bipolar';
  const { cycle, largestInput } = synthesis;
  const line = levelLine(cycle, largestInput, level, isBipolar);
  const lowest = isBipolar ? -1 : 0;
  const clippedSamples =
    level.transfer === 'none'
      ? alongLine(cycle, line, lowest)
      : throughTransfer(cycle, line, lowest, transferCurve(level.transfer));
  return {
    cycle,
    clippedSamples,
    warnings: clippedSamples === 0 ? [] : [clippedWarning(clippedSamples, isBipolar)],
  };
}

function clippedWarning(count: number, isBipolar: boolean): Warning {
  const entries = count === 1 ? '1 entry leaves' : `${count} entries leave`;
  const range = isBipolar ? '−1…1' : '0…1';
  return {
    code: 'clipped',
    path: 'level',
    message: `${entries} the range ${range} and ${count === 1 ? 'is' : 'are'} clipped.`,
  };
}

/** Mean, normalisation and level as one straight line: `(x − from)/divisor·multiplier + to`. */
interface LevelLine {
  readonly from: number;
  readonly divisor: number;
  readonly multiplier: number;
  readonly to: number;
}

function levelLine(
  cycle: Float64Array,
  largestInput: number,
  { removeMean, normalise, level }: LevelSettings,
  isBipolar: boolean,
): LevelLine {
  const { sum, lowest, highest } = extentOf(cycle);
  const from = removeMean ? sum / cycle.length : 0;
  // An entry that is no number, or a mean beyond a double, shows in the ends.
  const isHeld = Number.isFinite(lowest - from) && Number.isFinite(highest - from);
  if (!isHeld || (normalise === 'span' && !Number.isFinite(highest - lowest))) {
    refuseSignal('a signal beyond the range of a double', 'smaller amplitudes');
  }
  if (normalise === 'none') return { from, divisor: 1, multiplier: level, to: 0 };

  if (normalise === 'peak') {
    const peak = Math.max(from - lowest, highest - from);
    if (!(peak > zeroFraction * largestInput)) {
      refuseSignal('a zero signal', 'a signal to normalise, or level.normalise "none"');
    }
    return { from, divisor: peak, multiplier: level, to: 0 };
  }
  const span = highest - lowest;
  if (!(span > zeroFraction * largestInput)) {
    refuseSignal('a constant signal', 'a signal that moves, or level.normalise "peak" or "none"');
  }
  return isBipolar
    ? { from: lowest, divisor: span, multiplier: 2 * level, to: -level }
    : { from: lowest, divisor: span, multiplier: level, to: 0.5 - 0.5 * level };
}

function refuseSignal(value: string, allowed: string): never {
  throw new Refusal({ path: 'source', value, allowed });
}

/** Sum and ends; one entry that is no number makes both ends none. */
function extentOf(cycle: Float64Array): { sum: number; lowest: number; highest: number } {
  let sum = 0;
  let lowest = Infinity;
  let highest = -Infinity;
  for (let k = 0; k < cycle.length; k += 1) {
    sum += cycle[k];
    lowest = Math.min(lowest, cycle[k]);
    highest = Math.max(highest, cycle[k]);
  }
  return { sum, lowest, highest };
}

/** Takes each entry along the line and clips it; answers how many were clipped by more than rounding. */
function alongLine(
  cycle: Float64Array,
  { from, divisor, multiplier, to }: LevelLine,
  lowest: number,
): number {
  let clipped = 0;
  for (let k = 0; k < cycle.length; k += 1) {
    let x = ((cycle[k] - from) / divisor) * multiplier + to;
    if (x > 1) {
      if (x > 1 + clipTolerance) clipped += 1;
      x = 1;
    } else if (x < lowest) {
      if (x < lowest - clipTolerance) clipped += 1;
      x = lowest;
    }
    cycle[k] = x;
  }
  return clipped;
}

const asItIs: LevelLine = { from: 0, divisor: 1, multiplier: 1, to: 0 };

/** The same with a curve before the clip. */
function throughTransfer(
  cycle: Float64Array,
  line: LevelLine,
  lowest: number,
  curve: (x: number) => number,
): number {
  const { from, divisor, multiplier, to } = line;
  for (let k = 0; k < cycle.length; k += 1) cycle[k] = curve(((cycle[k] - from) / divisor) * multiplier + to);
  return alongLine(cycle, asItIs, lowest);
}

/** Below 0 a curve has no meaning: such a sample stays below 0 and is clipped, and counted, afterwards. */
function transferCurve(transfer: Exclude<Transfer, 'none'>): (x: number) => number {
  if (transfer === 'cie-lightness') return (x) => luminanceOf(100 * x);
  const { gamma } = transfer;
  return (x) => (x > 0 ? x ** gamma : x);
}

/** Relative luminance 0…1 of a CIE 1976 lightness L* 0…100 (CIE 15). */
function luminanceOf(lightness: number): number {
  return lightness > 8 ? ((lightness + 16) / 116) ** 3 : lightness / 903.3;
}
