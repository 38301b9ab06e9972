import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import type { ResistorBag } from '../contract/index.ts';

export interface Assignment {
  readonly rungs: readonly number[];
  readonly series: readonly number[];
  readonly terminator: number;
  /** Largest |DNL| of that ladder, in LSB. */
  readonly maxDnl: number;
  /**
   * `exhaustive`: every arrangement was tried and none is better. `search`: annealing from several beginnings; good,
   * with no promise that it is the best.
   */
  readonly method: 'exhaustive' | 'search';
  /** Arrangements looked at. */
  readonly tried: number;
}

const searchStarts = 8;
const stepsPerStart = 40_000;

/**
 * Places a measured resistor each on the ladder's places so that the largest |DNL| is small.
 *
 * @param options.mostTried arrangements up to which all are tried; beyond, a search that a seed makes repeatable
 */
export function assignResistors(bag: ResistorBag, { seed = 1, mostTried = 200_000 } = {}): Assignment {
  const arrangement = new Arrangement(bag);
  if (arrangementsOf(bag) <= mostTried) {
    arrangement.tryAll();
    return arrangement.best('exhaustive');
  }
  arrangement.search(seed);
  return arrangement.best('search');
}

function arrangementsOf({ bits, singles, doubles }: ResistorBag): number {
  const choose = (from: number, places: number) => {
    let ways = 1;
    for (let k = 0; k < places; k += 1) ways *= from - k;
    return ways;
  };
  return choose(singles.length, bits - 1) * choose(doubles.length, bits + 1);
}

class Arrangement {
  readonly #bits: number;
  readonly #pinOhms: number;
  /** All resistors of the bag; the first are in use: series of the singles, rungs and then terminator of the doubles. */
  readonly #singles: Float64Array;
  readonly #doubles: Float64Array;
  readonly #weights: Float64Array;
  readonly #bestSingles: Float64Array;
  readonly #bestDoubles: Float64Array;
  #bestDnl = Infinity;
  #tried = 0;

  constructor({ bits, singles, doubles, pinOhms }: ResistorBag) {
    this.#bits = bits;
    this.#pinOhms = pinOhms;
    this.#singles = Float64Array.from(singles);
    this.#doubles = Float64Array.from(doubles);
    this.#weights = new Float64Array(bits);
    this.#bestSingles = Float64Array.from(singles);
    this.#bestDoubles = Float64Array.from(doubles);
  }

  /**
   * Largest |DNL|. With like pins the bits add up, and a step that carries into bit k is `w_k − Σ w_j, j < k`, whatever
   * the bits above: b steps stand for all.
   */
  #maxDnl(): number {
    const bits = this.#bits;
    const weights = this.#weights;
    const pin = this.#pinOhms;
    let ohms = 1 / (1 / this.#doubles[bits] + 1 / (this.#doubles[0] + pin));
    weights[0] = ohms / (this.#doubles[0] + pin);
    for (let bit = 1; bit < bits; bit += 1) {
      const rung = this.#doubles[bit] + pin;
      const t = ohms + this.#singles[bit - 1];
      const share = rung / (rung + t);
      for (let below = 0; below < bit; below += 1) weights[below] *= share;
      weights[bit] = t / (rung + t);
      ohms = t * share;
    }
    let below = 0;
    let least = Infinity;
    let most = -Infinity;
    for (let bit = 0; bit < bits; bit += 1) {
      const step = weights[bit] - below;
      below += weights[bit];
      least = Math.min(least, step);
      most = Math.max(most, step);
    }
    const lsb = below / (2 ** bits - 1);
    return Math.max(most / lsb - 1, 1 - least / lsb);
  }

  #look(): number {
    this.#tried += 1;
    const dnl = this.#maxDnl();
    if (dnl < this.#bestDnl) {
      this.#bestDnl = dnl;
      this.#bestSingles.set(this.#singles);
      this.#bestDoubles.set(this.#doubles);
    }
    return dnl;
  }

  tryAll(): void {
    arrange(this.#singles, this.#bits - 1, () =>
      arrange(this.#doubles, this.#bits + 1, () => void this.#look()),
    );
  }

  /** Simulated annealing (Kirkpatrick, Gelatt & Vecchi 1983): two resistors change places, worse ones ever more rarely. */
  search(seed: number): void {
    const generator = xoroshiro128plus(seed);
    const draw = () => ((generator.next() >>> 0) + 0.5) / 2 ** 32;
    const below = (count: number) => Math.floor(draw() * count);
    for (let start = 0; start < searchStarts; start += 1) {
      for (const list of [this.#singles, this.#doubles]) {
        for (let place = list.length - 1; place > 0; place -= 1) swap(list, place, below(place + 1));
      }
      let here = this.#look();
      const hot = here;
      for (let step = 0; step < stepsPerStart; step += 1) {
        const temperature = hot * 0.3 * 1e-4 ** (step / stepsPerStart);
        const inUse = 2 * this.#bits;
        const isDouble = below(inUse) <= this.#bits;
        const list = isDouble ? this.#doubles : this.#singles;
        const a = below(isDouble ? this.#bits + 1 : this.#bits - 1);
        const b = below(list.length);
        swap(list, a, b);
        const there = this.#look();
        if (there <= here || draw() < Math.exp((here - there) / temperature)) here = there;
        else swap(list, a, b);
      }
    }
  }

  best(method: Assignment['method']): Assignment {
    const bits = this.#bits;
    return {
      rungs: Array.from(this.#bestDoubles.subarray(0, bits)),
      series: Array.from(this.#bestSingles.subarray(0, bits - 1)),
      terminator: this.#bestDoubles[bits],
      maxDnl: this.#bestDnl,
      method,
      tried: this.#tried,
    };
  }
}

function swap(list: Float64Array, a: number, b: number): void {
  const kept = list[a];
  list[a] = list[b];
  list[b] = kept;
}

/** Every way to fill the first `places` of a list from all of it; leaves the list as it was. */
function arrange(list: Float64Array, places: number, look: () => void, place = 0): void {
  if (place === places) return look();
  for (let from = place; from < list.length; from += 1) {
    swap(list, place, from);
    arrange(list, places, look, place + 1);
    swap(list, place, from);
  }
}
