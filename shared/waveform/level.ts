import { Refusal, type Definition, type LevelSettings, type Transfer, type Warning } from '../contract/index.ts';
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
  const { cycle } = synthesis;
  if (level.removeMean) subtractMean(cycle);
  // A sum beyond a double, that of the mean too, shows as an entry that is not finite.
  if (!isAllFinite(cycle)) refuseSignal('a signal beyond the range of a double', 'smaller amplitudes');
  if (level.normalise === 'peak') scaleToPeak(cycle, synthesis.largestInput);
  if (level.normalise === 'span') scaleToSpan(cycle, synthesis.largestInput, isBipolar);
  if (level.level !== 1) applyLevel(cycle, level, isBipolar);
  applyTransfer(cycle, level.transfer);

  const clippedSamples = clip(cycle, isBipolar ? -1 : 0);
  const warnings: Warning[] = [];
  if (clippedSamples > 0) {
    const entries = clippedSamples === 1 ? '1 entry leaves' : `${clippedSamples} entries leave`;
    warnings.push({
      code: 'clipped',
      path: 'level',
      message: `${entries} the range ${isBipolar ? '−1…1' : '0…1'} and ${clippedSamples === 1 ? 'is' : 'are'} clipped.`,
    });
  }
  return { cycle, clippedSamples, warnings };
}

function refuseSignal(value: string, allowed: string): never {
  throw new Refusal({ path: 'source', value, allowed });
}

/** Whether all entries are: x − x is NaN for an entry that is not finite, and then so is the sum. */
function isAllFinite(cycle: Float64Array): boolean {
  let sum = 0;
  for (let k = 0; k < cycle.length; k += 1) sum += cycle[k] - cycle[k];
  return sum === 0;
}

function subtractMean(cycle: Float64Array): void {
  let sum = 0;
  for (let k = 0; k < cycle.length; k += 1) sum += cycle[k];
  const mean = sum / cycle.length;
  for (let k = 0; k < cycle.length; k += 1) cycle[k] -= mean;
}

function extremesOf(cycle: Float64Array): { lowest: number; highest: number } {
  let lowest = Infinity;
  let highest = -Infinity;
  for (let k = 0; k < cycle.length; k += 1) {
    if (cycle[k] < lowest) lowest = cycle[k];
    if (cycle[k] > highest) highest = cycle[k];
  }
  return { lowest, highest };
}

function scaleToPeak(cycle: Float64Array, largestInput: number): void {
  const { lowest, highest } = extremesOf(cycle);
  const peak = Math.max(-lowest, highest);
  if (!(peak > zeroFraction * largestInput)) {
    refuseSignal('a zero signal', 'a signal to normalise, or level.normalise "none"');
  }
  for (let k = 0; k < cycle.length; k += 1) cycle[k] /= peak;
}

function scaleToSpan(cycle: Float64Array, largestInput: number, isBipolar: boolean): void {
  const { lowest, highest } = extremesOf(cycle);
  const span = highest - lowest;
  if (!(span > zeroFraction * largestInput)) {
    refuseSignal('a constant signal', 'a signal that moves, or level.normalise "peak" or "none"');
  }
  if (!Number.isFinite(span)) refuseSignal('a signal beyond the range of a double', 'smaller amplitudes');
  for (let k = 0; k < cycle.length; k += 1) {
    const share = (cycle[k] - lowest) / span;
    cycle[k] = isBipolar ? 2 * share - 1 : share;
  }
}

function applyLevel(cycle: Float64Array, { level, normalise }: LevelSettings, isBipolar: boolean): void {
  const middle = normalise === 'span' && !isBipolar ? 0.5 : 0;
  for (let k = 0; k < cycle.length; k += 1) cycle[k] = middle + (cycle[k] - middle) * level;
}

/** Below 0 the curves have no meaning: such a sample keeps its sign and is clipped, and counted, afterwards. */
function applyTransfer(cycle: Float64Array, transfer: Transfer): void {
  if (transfer === 'none') return;
  if (transfer === 'cie-lightness') {
    for (let k = 0; k < cycle.length; k += 1) cycle[k] = luminanceOf(100 * cycle[k]);
    return;
  }
  const { gamma } = transfer;
  for (let k = 0; k < cycle.length; k += 1) if (cycle[k] > 0) cycle[k] **= gamma;
}

/** Relative luminance 0…1 of a CIE 1976 lightness L* 0…100 (CIE 15). */
function luminanceOf(lightness: number): number {
  return lightness > 8 ? ((lightness + 16) / 116) ** 3 : lightness / 903.3;
}

function clip(cycle: Float64Array, lowest: number): number {
  let clipped = 0;
  for (let k = 0; k < cycle.length; k += 1) {
    const sample = cycle[k];
    if (sample > 1) {
      if (sample > 1 + clipTolerance) clipped += 1;
      cycle[k] = 1;
    } else if (sample < lowest) {
      if (sample < lowest - clipTolerance) clipped += 1;
      cycle[k] = lowest;
    }
  }
  return clipped;
}
