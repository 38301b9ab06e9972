import type { OpAmp, OutputFilter } from '../contract/index.ts';
import { apply, changeOver, propagatorOf, type Matrix } from './propagator.ts';
import { bufferAfter, modeOf, nodeAfter, timeInMode, type Follower, type Mode } from './slewing.ts';

export interface StageInput {
  /** Level of each code, in V, and resistance behind it, in Ω. */
  readonly volts: ArrayLike<number>;
  readonly outputOhms: ArrayLike<number>;
  /** Codes of one loop. */
  readonly codes: ArrayLike<number>;
  readonly sampleRateHz: number;
  /** Capacitance of the output node, in F. */
  readonly capacitanceF: number;
  readonly opAmp?: OpAmp;
  readonly filter: OutputFilter;
  /** Points drawn in each held sample, the first where it begins. */
  readonly pointsPerHold: number;
}

/** One period of a loop that has played for ever, in V; point i belongs to time i/(pointsPerHold·fs). */
export interface StageWaveform {
  readonly timeS: Float64Array;
  /** At the converter's pin; after the op-amp; after the filter. A part that is not there changes nothing. */
  readonly pin: Float64Array;
  readonly buffer: Float64Array;
  readonly output: Float64Array;
  /**
   * Whether the period ends as it begins, to 10⁻⁹ of the span. An op-amp that slews all the time keeps where it began:
   * many beginnings are steady then, and one of them is shown.
   */
  readonly isSteady: boolean;
  /** Share of the time in which the op-amp slews, 0…1. */
  readonly slewingShare: number;
}

// Places in the state: pin, buffer, two of the filter, the level that the pin nears, and 1.
const size = 6;
const [pinAt, bufferAt, filterAt, slopeAt, levelAt, oneAt] = [0, 1, 2, 3, 4, 5];
const mostPeriods = 100;
/** In one hold a follower begins to slew, ends and begins the other way at most; more is rounding at the limit. */
const mostChanges = 8;

/**
 * The staircase of a loop through the stage: a capacitance behind the converter's resistance, a follower of one pole
 * with a limited slew rate, a filter. Between edges, and between moments at which the op-amp begins or ends to slew,
 * this is a linear system with constant inputs and is carried on exactly; those moments are roots found to the last
 * bits. The state at the start is the one that the period ends with.
 */
export function stageWaveform(input: StageInput): StageWaveform {
  const { codes, pointsPerHold, sampleRateHz } = input;
  const stage = new StageRun(input);
  const start = stage.steadyStart();
  const points = codes.length * pointsPerHold;
  const wave = {
    timeS: Float64Array.from({ length: points }, (_, i) => i / (pointsPerHold * sampleRateHz)),
    pin: new Float64Array(points),
    buffer: new Float64Array(points),
    output: new Float64Array(points),
  };
  const hasFilter = input.filter.kind !== 'none';
  const { end, slewingS } = stage.period(start.state, (state, i) => {
    wave.pin[i] = state[pinAt];
    wave.buffer[i] = input.opAmp === undefined ? state[pinAt] : state[bufferAt];
    wave.output[i] = hasFilter ? state[filterAt] : wave.buffer[i];
  });
  const far = Math.max(...[pinAt, bufferAt, filterAt].map((at) => Math.abs(end[at] - start.state[at])));
  return {
    ...wave,
    isSteady: far <= 1e-9 * stage.span,
    slewingShare: (slewingS * sampleRateHz) / codes.length,
  };
}

type Draw = (state: Float64Array, point: number) => void;

class StageRun {
  readonly span: number;
  readonly #low: number;
  readonly #input: StageInput;
  readonly #holdS: number;
  readonly #pointS: number;
  readonly #follower: Follower | null;
  /** For modes −1, 0 and 1, by time constant: rates of change, and propagators over one point. */
  readonly #rates = [new Map<number, Matrix>(), new Map<number, Matrix>(), new Map<number, Matrix>()];
  readonly #perPoint = [new Map<number, Matrix>(), new Map<number, Matrix>(), new Map<number, Matrix>()];

  constructor(input: StageInput) {
    const { volts, codes, opAmp, sampleRateHz, pointsPerHold } = input;
    this.#input = input;
    this.#holdS = 1 / sampleRateHz;
    this.#pointS = 1 / (sampleRateHz * pointsPerHold);
    this.#follower =
      opAmp === undefined ? null : { rate: 2 * Math.PI * opAmp.gainBandwidthHz, slew: opAmp.slewRateVPerS };
    let low = Infinity;
    let high = -Infinity;
    for (let k = 0; k < codes.length; k += 1) {
      low = Math.min(low, volts[codes[k]]);
      high = Math.max(high, volts[codes[k]]);
    }
    this.#low = low;
    this.span = high > low ? high - low : 1;
  }

  #tauOf(code: number): number {
    return this.#input.outputOhms[code] * this.#input.capacitanceF;
  }

  /** `d/dt` of the state in one mode. */
  #matrixOf(mode: Mode, tau: number): Matrix {
    const { filter } = this.#input;
    const matrix = new Float64Array(size * size);
    const set = (row: number, column: number, value: number) => (matrix[row * size + column] = value);
    if (tau > 0) {
      set(pinAt, pinAt, -1 / tau);
      set(pinAt, levelAt, 1 / tau);
    }
    const follower = this.#follower;
    if (follower !== null && mode === 0) {
      set(bufferAt, bufferAt, -follower.rate);
      set(bufferAt, pinAt, follower.rate);
    }
    if (follower !== null && mode !== 0) set(bufferAt, oneAt, mode * follower.slew);
    const from = follower === null ? pinAt : bufferAt;
    if (filter.kind === 'none') return matrix;
    const rate = 2 * Math.PI * filter.cutoffHz;
    if (filter.kind === 'rc') {
      set(filterAt, filterAt, -rate);
      set(filterAt, from, rate);
    } else {
      // z'' + √2·ω·z' + ω²·z = ω²·y, with the second state z'/ω.
      set(filterAt, slopeAt, rate);
      set(slopeAt, from, rate);
      set(slopeAt, filterAt, -rate);
      set(slopeAt, slopeAt, -Math.SQRT2 * rate);
    }
    return matrix;
  }

  #propagator(mode: Mode, tau: number, t: number): Matrix {
    let rates = this.#rates[mode + 1].get(tau);
    if (rates === undefined) {
      rates = this.#matrixOf(mode, tau);
      this.#rates[mode + 1].set(tau, rates);
    }
    // Whole points come again and again; what is left between moments of slewing does not.
    if (t !== this.#pointS) return propagatorOf(rates, size, t);
    const known = this.#perPoint[mode + 1].get(tau);
    if (known !== undefined) return known;
    const made = propagatorOf(rates, size, t);
    this.#perPoint[mode + 1].set(tau, made);
    return made;
  }

  /**
   * Runs one period from a state; answers the state at its end.
   *
   * @param withFilter false leaves the filter where it was
   */
  period(
    start: Float64Array,
    draw?: Draw,
    withFilter = this.#input.filter.kind !== 'none',
  ): { end: Float64Array; slewingS: number } {
    const { codes, volts, pointsPerHold } = this.#input;
    let state = Float64Array.from(start);
    let next = new Float64Array(size);
    let slewingS = 0;
    const carry = (mode: Mode, tau: number, t: number) => {
      if (withFilter) {
        apply(this.#propagator(mode, tau, t), state, next);
        [state, next] = [next, state];
      } else {
        const before = this.#stateOf(state, tau);
        if (this.#follower !== null) state[bufferAt] = bufferAfter(before, mode, this.#follower, t);
        state[pinAt] = nodeAfter(before, t);
      }
      if (mode !== 0) slewingS += t;
    };
    for (let k = 0; k < codes.length; k += 1) {
      const tau = this.#tauOf(codes[k]);
      state[levelAt] = volts[codes[k]];
      if (tau === 0) state[pinAt] = state[levelAt];
      let mode = this.#modeOf(state, tau);
      let left = this.#timeIn(mode, state, tau);
      let changes = 0;
      for (let point = 0; point < pointsPerHold; point += 1) {
        draw?.(state, k * pointsPerHold + point);
        let toGo = this.#pointS;
        while (left < toGo && changes < mostChanges) {
          carry(mode, tau, left);
          toGo -= left;
          changes += 1;
          mode = mode === 0 ? this.#slewMode(state) : 0;
          left = this.#timeIn(mode, state, tau);
        }
        carry(mode, tau, toGo);
        left -= toGo;
      }
    }
    return { end: state, slewingS };
  }

  #modeOf(state: Float64Array, tau: number): Mode {
    if (this.#follower === null) return 0;
    return modeOf(this.#stateOf(state, tau), this.#follower);
  }

  /** At the limit: the side on which it is. */
  #slewMode(state: Float64Array): Mode {
    return state[pinAt] > state[bufferAt] ? 1 : -1;
  }

  #timeIn(mode: Mode, state: Float64Array, tau: number): number {
    if (this.#follower === null) return Infinity;
    return timeInMode(this.#stateOf(state, tau), mode, this.#follower, this.#holdS);
  }

  #stateOf(state: Float64Array, tau: number) {
    return { level: state[levelAt], node: state[pinAt], buffer: state[bufferAt], tau };
  }

  /** The state that a period ends with if it begins with it. */
  steadyStart(): { state: Float64Array } {
    const state = new Float64Array(size);
    state[oneAt] = 1;
    state[pinAt] = this.#steadyPin();
    state[bufferAt] = this.#steadyBuffer(state);
    this.#setSteadyFilter(state);
    return { state };
  }

  /**
   * The follower by itself. A higher beginning ends no lower, and no further from another's end than it began: what a
   * period adds falls as the beginning rises, from above 0 at the lowest level to below 0 at the highest. Its root is
   * found by false position with the Illinois rule; without slewing it is a straight line.
   */
  #steadyBuffer(start: Float64Array): number {
    const at = Float64Array.from(start);
    const added = (beginning: number) => {
      at[bufferAt] = beginning;
      return this.period(at, undefined, false).end[bufferAt] - beginning;
    };
    const near = 1e-13 * this.span;
    const first = start[pinAt];
    if (this.#follower === null || Math.abs(added(first)) <= near) return first;
    let [low, high] = [this.#low, this.#low + this.span];
    let [addedLow, addedHigh] = [added(low), added(high)];
    let side = 0;
    for (let turn = 0; turn < mostPeriods && addedLow > near && addedHigh < -near; turn += 1) {
      const next = low + ((high - low) * addedLow) / (addedLow - addedHigh);
      const here = added(next);
      if (here > 0) {
        [low, addedLow] = [next, here];
        if (side === 1) addedHigh /= 2;
        side = 1;
      } else {
        [high, addedHigh] = [next, here];
        if (side === -1) addedLow /= 2;
        side = -1;
      }
    }
    return addedLow <= near ? low : high;
  }

  /** The pin by itself: `p ← V + (p − V)·e^(−T/τ)` for each sample, a straight line from start to end. */
  #steadyPin(): number {
    const { codes, volts } = this.#input;
    // Shares far below 1 are wanted with all their digits: hence expm1.
    let exponent = 0;
    let own = 0;
    for (let k = 0; k < codes.length; k += 1) {
      const tau = this.#tauOf(codes[k]);
      const passed = tau === 0 ? -Infinity : -this.#holdS / tau;
      exponent += passed;
      own += (volts[codes[k]] - own) * -Math.expm1(passed);
    }
    return own / -Math.expm1(exponent);
  }

  /** The filter is linear in what it began with, whatever the op-amp does: `z = Φz + c` is solved. */
  #setSteadyFilter(state: Float64Array): void {
    const { filter, codes } = this.#input;
    if (filter.kind === 'none') return;
    const forced = this.period(state).end;
    const own = changeOver(this.#matrixOf(0, 0), size, this.#holdS * codes.length);
    const at = (row: number, column: number) => -own[row * size + column];
    if (filter.kind === 'rc') {
      state[filterAt] = forced[filterAt] / at(filterAt, filterAt);
      return;
    }
    const [a, b, c, d] = [
      at(filterAt, filterAt),
      at(filterAt, slopeAt),
      at(slopeAt, filterAt),
      at(slopeAt, slopeAt),
    ];
    const determinant = a * d - b * c;
    state[filterAt] = (d * forced[filterAt] - b * forced[slopeAt]) / determinant;
    state[slopeAt] = (a * forced[slopeAt] - c * forced[filterAt]) / determinant;
  }
}
