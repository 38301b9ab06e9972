import type { Ladder, TrialSettings } from '../contract/index.ts';
import { drawsOf } from './draws.ts';
import { Elimination } from './elimination.ts';
import { nearestRank, sortedFigures } from './percentiles.ts';
import { TableThrough, type PlayedTable } from './table-through.ts';

/** Figures of each build in the order they were drawn; NaN where one does not exist. */
export interface TrialFigures {
  /** Largest |INL| and |DNL|, in LSB. */
  readonly maxInl: Float64Array;
  readonly maxDnl: Float64Array;
  /** 1 where every step goes up. */
  readonly monotonic: Uint8Array;
  /** Of the table through the ladder; empty where there is no table. */
  readonly sinadDb: Float64Array;
  readonly unwantedDb: Float64Array;
}

export interface TrialSummary {
  /** Builds looked at so far, and builds asked for. */
  readonly done: number;
  readonly trials: number;
  /** Share of monotonic builds, 0…1; null before the first. */
  readonly monotonicShare: number | null;
  /** Largest |INL|, |DNL| in LSB, and strongest unwanted line: what 50, 95, 99 % of builds do not exceed. */
  readonly maxInl: Percentiles;
  readonly maxDnl: Percentiles;
  readonly unwantedDb: Percentiles;
  /** SINAD that 50, 95, 99 % of builds reach: the 50th, 5th and 1st percentile. */
  readonly sinadDb: { readonly p50: number | null; readonly p5: number | null; readonly p1: number | null };
}

export interface Percentiles {
  readonly p50: number | null;
  readonly p95: number | null;
  readonly p99: number | null;
}

/** Tolerance trials under way: run on in parts, looked at and left at any time. */
export class Trials {
  readonly trials: number;
  #done = 0;
  readonly #draws: ReturnType<typeof drawsOf>;
  readonly #elimination: Elimination;
  readonly #volts: Float64Array;
  readonly #through: TableThrough | null;
  readonly #figures: TrialFigures;
  readonly #worst: WorstSteps = { inl: 0, leastStep: 0, mostStep: 0 };

  /** @param table plays through each build where it is given */
  constructor(ladder: Ladder, settings: TrialSettings, table?: PlayedTable) {
    const { trials } = settings;
    this.trials = trials;
    this.#draws = drawsOf(ladder, settings);
    this.#elimination = new Elimination(ladder);
    this.#volts = new Float64Array(2 ** ladder.bits);
    this.#through = table === undefined ? null : new TableThrough(table);
    this.#figures = {
      maxInl: new Float64Array(trials),
      maxDnl: new Float64Array(trials),
      monotonic: new Uint8Array(trials),
      sinadDb: new Float64Array(table === undefined ? 0 : trials),
      unwantedDb: new Float64Array(table === undefined ? 0 : trials),
    };
  }

  get done(): number {
    return this.#done;
  }

  get isDone(): boolean {
    return this.#done === this.trials;
  }

  /** Builds about `count` more ladders, in pairs; answers how many there are now. */
  run(count: number): number {
    // Two builds share a transform, always the same two: figures do not depend on where a run paused.
    const end = Math.min(this.trials, this.#done + 2 * Math.ceil(count / 2));
    for (; this.#done < end; this.#done += 1) this.#build(this.#done);
    this.#through?.flush();
    return this.#done;
  }

  #build(trial: number): void {
    const volts = this.#volts;
    const { maxInl, maxDnl, monotonic, sinadDb, unwantedDb } = this.#figures;
    this.#elimination.run(this.#draws.next());
    this.#elimination.outputs(volts);

    const worst = this.#worst;
    worstOf(volts, worst);
    const isMonotonic = worst.leastStep > 0;
    maxInl[trial] = worst.inl;
    maxDnl[trial] = Math.max(worst.mostStep - 1, 1 - worst.leastStep);
    monotonic[trial] = isMonotonic ? 1 : 0;
    if (this.#through === null) return;
    const [low, high] = isMonotonic ? [volts[0], volts[volts.length - 1]] : extremesOf(volts);
    this.#through.add(volts, low, high, (sinad, unwanted) => {
      sinadDb[trial] = sinad;
      unwantedDb[trial] = unwanted;
    });
  }

  /** Figures of the builds so far, as views. */
  figures(): TrialFigures {
    const { maxInl, maxDnl, monotonic, sinadDb, unwantedDb } = this.#figures;
    const done = this.#done;
    return {
      maxInl: maxInl.subarray(0, done),
      maxDnl: maxDnl.subarray(0, done),
      monotonic: monotonic.subarray(0, done),
      sinadDb: sinadDb.subarray(0, done),
      unwantedDb: unwantedDb.subarray(0, done),
    };
  }

  summary(): TrialSummary {
    const { maxInl, maxDnl, monotonic, sinadDb, unwantedDb } = this.figures();
    const sinads = sortedFigures(sinadDb);
    let rising = 0;
    for (const is of monotonic) rising += is;
    return {
      done: this.#done,
      trials: this.trials,
      monotonicShare: this.#done === 0 ? null : rising / this.#done,
      maxInl: percentilesOf(maxInl),
      maxDnl: percentilesOf(maxDnl),
      unwantedDb: percentilesOf(unwantedDb),
      sinadDb: {
        p50: nearestRank(sinads, 0.5),
        p5: nearestRank(sinads, 0.05),
        p1: nearestRank(sinads, 0.01),
      },
    };
  }
}

/** Largest |INL|, and least and most step, in LSB. */
interface WorstSteps {
  inl: number;
  leastStep: number;
  mostStep: number;
}

/** Linearity as in linearity.ts, without its lists. */
function worstOf(volts: Float64Array, worst: WorstSteps): void {
  const top = volts.length - 1;
  const first = volts[0];
  const perLsb = top / (volts[top] - first);
  let leastStep = Infinity;
  let mostStep = -Infinity;
  let farthest = 0;
  let before = first;
  for (let code = 1; code <= top; code += 1) {
    const here = volts[code];
    const step = here - before;
    const inl = Math.abs((here - first) * perLsb - code);
    before = here;
    if (step < leastStep) leastStep = step;
    if (step > mostStep) mostStep = step;
    if (inl > farthest) farthest = inl;
  }
  worst.inl = farthest;
  worst.leastStep = leastStep * perLsb;
  worst.mostStep = mostStep * perLsb;
}

function extremesOf(volts: Float64Array): [low: number, high: number] {
  let low = Infinity;
  let high = -Infinity;
  for (let code = 0; code < volts.length; code += 1) {
    if (volts[code] < low) low = volts[code];
    if (volts[code] > high) high = volts[code];
  }
  return [low, high];
}

function percentilesOf(values: Float64Array): Percentiles {
  const sorted = sortedFigures(values);
  return { p50: nearestRank(sorted, 0.5), p95: nearestRank(sorted, 0.95), p99: nearestRank(sorted, 0.99) };
}
