import { Refusal } from '../contract/index.ts';
import { mustBePositive, mustBeWhole } from './inputs.ts';
import { centsBetween, ratioApart } from './pitch.ts';

/** A timer that makes the sample rate: `fs = fclk/(prescaler·(compare+1))`. */
export interface Timer {
  readonly clockHz: number;
  /** Those that the timer offers, whole numbers from 1. */
  readonly prescalers: readonly number[];
  /** Width of the compare register, 1…32: it holds 0…2^bits − 1. */
  readonly compareBits: number;
  /** The clock's own tolerance, in parts per million to either side. */
  readonly clockTolerancePpm?: number;
}

export interface WantedTone {
  readonly wantedHz: number;
  /** Table lengths that may be used. */
  readonly lengths: readonly number[];
  /** Numbers of cycles that the table may hold; `2K < N`, or 1. */
  readonly cycles?: readonly number[];
  /** Clock cycles that a sample costs the handler or the loop. */
  readonly costCycles?: number;
  /** How many settings to give at most. */
  readonly limit?: number;
}

/** One setting of the timer for a tone of K cycles in N entries. */
export interface RatePlan {
  readonly prescaler: number;
  /** The compare register's value. */
  readonly compare: number;
  readonly sampleRateHz: number;
  readonly tableLength: number;
  readonly cycles: number;
  /** `K·fs/N`. */
  readonly actualHz: number;
  /** `1200·log2(actual/wanted)`. */
  readonly errorCents: number;
  /** What the clock's tolerance is worth, to either side; `null` where none is named. */
  readonly toleranceCents: number | null;
  /** Clock cycles between two samples. */
  readonly cyclesPerSample: number;
  /** Whether the cost fits between two samples; `null` where none is named. */
  readonly fits: boolean | null;
}

const plansByDefault = 50;

/**
 * Settings for a wanted tone, the least error first; of equal ones the shortest table, then the fewest cycles, then
 * the lowest prescaler. For each length, number of cycles and prescaler the compare values on both sides of the
 * wanted tone are considered; where it lies beyond the register's range, the nearest that the register holds.
 *
 * @throws {Refusal} where an input is no number of its range.
 */
export function planRates(timer: Timer, wanted: WantedTone): RatePlan[] {
  const { wantedHz, lengths, cycles = [1], costCycles, limit = plansByDefault } = wanted;
  check(timer, wanted);
  const found: { plan: RatePlan; apart: number }[] = [];
  for (const tableLength of lengths) {
    for (const held of cycles) {
      if (held > 1 && 2 * held >= tableLength) continue;
      for (const prescaler of timer.prescalers) {
        for (const compare of comparesAround(timer, prescaler, held / tableLength / wantedHz)) {
          const plan = planOf(timer, { wantedHz, costCycles }, { tableLength, held, prescaler, compare });
          found.push({ plan, apart: ratioApart(plan.actualHz, wantedHz) });
        }
      }
    }
  }
  return found
    .sort((a, b) => a.apart - b.apart || bySimplicity(a.plan, b.plan))
    .slice(0, limit)
    .map(({ plan }) => plan);
}

const bySimplicity = (a: RatePlan, b: RatePlan) =>
  a.tableLength - b.tableLength || a.cycles - b.cycles || a.prescaler - b.prescaler || a.compare - b.compare;

/** The compare values on both sides of a wanted sample period in seconds; beyond the register's ends, that end. */
function comparesAround({ clockHz, compareBits }: Timer, prescaler: number, periodS: number): number[] {
  const highest = 2 ** compareBits - 1;
  const below = Math.floor((clockHz * periodS) / prescaler) - 1;
  if (below < 0) return [0];
  if (below >= highest) return [highest];
  return [below, below + 1];
}

function planOf(
  { clockHz, clockTolerancePpm }: Timer,
  { wantedHz, costCycles }: Pick<WantedTone, 'wantedHz' | 'costCycles'>,
  setting: { tableLength: number; held: number; prescaler: number; compare: number },
): RatePlan {
  const { tableLength, held, prescaler, compare } = setting;
  const cyclesPerSample = prescaler * (compare + 1);
  const actualHz = (clockHz * held) / (cyclesPerSample * tableLength);
  return {
    prescaler,
    compare,
    sampleRateHz: clockHz / cyclesPerSample,
    tableLength,
    cycles: held,
    actualHz,
    errorCents: centsBetween(actualHz, wantedHz),
    toleranceCents: clockTolerancePpm === undefined ? null : centsBetween(1 + clockTolerancePpm / 1e6, 1),
    cyclesPerSample,
    fits: costCycles === undefined ? null : costCycles <= cyclesPerSample,
  };
}

function check(timer: Timer, { wantedHz, lengths, cycles = [1], costCycles = 0 }: WantedTone): void {
  mustBePositive('clockHz', timer.clockHz);
  mustBeWhole('compareBits', timer.compareBits, 1, 32);
  mustBePositive('wantedHz', wantedHz);
  mustBeSome('prescalers', timer.prescalers);
  mustBeSome('lengths', lengths);
  mustBeSome('cycles', cycles);
  timer.prescalers.forEach((prescaler, i) => mustBeWhole(`prescalers[${i}]`, prescaler, 1, 65_536));
  lengths.forEach((length, i) => mustBeWhole(`lengths[${i}]`, length, 2, 65_536));
  cycles.forEach((held, i) => mustBeWhole(`cycles[${i}]`, held, 1, 64));
  if (!(costCycles >= 0 && Number.isFinite(costCycles))) {
    throw new Refusal({ path: 'costCycles', value: String(costCycles), allowed: 'a number from 0' });
  }
  const tolerance = timer.clockTolerancePpm ?? 0;
  if (!(tolerance >= 0 && tolerance < 1e6)) {
    throw new Refusal({ path: 'clockTolerancePpm', value: String(tolerance), allowed: '0 to 1000000' });
  }
}

function mustBeSome(path: string, list: readonly number[]): void {
  if (list.length > 0) return;
  throw new Refusal({ path, value: 'an empty list', allowed: 'at least one' });
}
