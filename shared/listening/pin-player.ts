import { finalOf, kernelReach, kernelTerms, type StepKernel } from './kernel-shape.ts';
import type { Drive } from './sound.ts';

/**
 * Above this a program is refused, 4 MHz: each entry that differs from the one before costs some 5 ns, so that a table
 * that changes all the time takes 5 % of a core at this rate and its share grows with the rate from there.
 */
export const pinRateHzAtMost = 4e6;

/** What a pin plays. Plain data, so that it can be handed to the audio thread. */
export interface PinProgram {
  /** Level of each entry, the table's mean taken out. */
  readonly values: Float64Array;
  readonly drive: Drive;
  /** `stepKernel` of the player's context rate and what follows the pin; made off the audio thread. */
  readonly kernel: StepKernel;
}

/** Frames that are kept, those to come and those gone by: a power of two above any kernel's taps. */
const kept = 128;
const wrap = kept - 1;

/**
 * Plays a table as firmware does, one entry each period of the sample rate, and turns the pin's edges into frames without
 * folding: each edge Δ adds Δ times a band-limited step (step-kernel.ts), so that the staircase is heard with its hold and
 * all its images, flat within 0.001 dB up to 20/48 of the context's rate, and nothing from half the rate on (−97 dB).
 *
 * - `loop` goes round the table; `once` stays on the last entry; an accumulator plays entry `acc >> (M−p)`, first at
 *   acc = 0, then adds its step word. Doubles hold whole numbers up to 2⁵³, so that 48 bits stay exact.
 * - Frames come `pinDelayFrames` late. The pin is at 0, the table's mean, before its first entry. An accumulator that comes
 *   by a part of the entries alone keeps what the mean of those differs by.
 * - Only entries that differ from the one before cost, some 5 ns each, and each frame with such an edge in it some 0.5 µs:
 *   3 % of a core at most, and what the entries take. Nothing is allocated once it has been made.
 */
export class PinPlayer {
  readonly #contextRateHz: number;
  #values: Float64Array = new Float64Array(1);
  #drive: Drive = { kind: 'loop', sampleRateHz: 1 };
  #kernel: StepKernel = { taps: 0, terms: new Float64Array(0), feedback: new Float64Array(4) };
  /** What an edge of 1 rises to before the sections of the stage. */
  #final = 1;
  /** Frames to one entry. */
  #period = Infinity;
  /** Frames from the start of the next frame to the next entry; infinite where none is to come. */
  #until = 0;
  /** Place of the next entry, or the accumulator; what is added to it, and where it comes round. */
  #next = 0;
  #step = 1;
  #modulus = 1;
  /** Makes a place in the table of `#next`: 1, or a power of two. */
  #scale = 1;
  #level = 0;
  /** Of each frame kept, the sums of its edges' powers: Σ Δ·u^p. */
  readonly #powers = new Float64Array(kept * kernelTerms);
  /** Where the pin was at the end of each. */
  readonly #levels = new Float64Array(kept);
  /** Rises of the frames to come. All three are rings about `#frame`, the next one. */
  readonly #rises = new Float64Array(kept);
  readonly #risen = new Float64Array(kept);
  #frame = 0;
  #sum = 0;
  /** What the sections of the stage hold: s, t and the last two of y. */
  readonly #held = new Float64Array(4);
  #isSkipping = false;
  /** Frames until a `once` has been heard to its end. */
  #restFrames = Infinity;

  /** @param contextRateHz frames a second, above 0 */
  constructor(contextRateHz: number) {
    this.#contextRateHz = contextRateHz;
  }

  /**
   * Takes up a program; its place in the round goes on from the last one's. A new player begins at 0; `seek(0)` does so
   * again. What the pin did before is heard to its end through the new kernel: over to another stage, fade.
   *
   * @throws {RangeError} where the sample rate is not above 0 and at most `pinRateHzAtMost`
   */
  load({ values, drive, kernel }: PinProgram): void {
    checkRate(drive.sampleRateHz);
    const place = this.#next / this.#modulus;
    const part = Number.isFinite(this.#until) ? this.#until / this.#period : 0;
    const isSameKernel = kernel === this.#kernel;
    this.#values = values;
    this.#drive = drive;
    this.#kernel = kernel;
    this.#final = finalOf(kernel.feedback);
    this.#period = this.#contextRateHz / drive.sampleRateHz;
    this.#modulus = drive.kind === 'accumulator' ? 2 ** drive.accumulatorBits : values.length;
    this.#step = drive.kind === 'accumulator' ? drive.stepWord : 1;
    this.#scale = values.length / this.#modulus;
    // A place told in another length may come out a rounding below a whole number.
    this.#next = Math.floor(place * this.#modulus + 1e-6) % this.#modulus;
    this.#until = part * this.#period;
    this.#restFrames = Infinity;
    if (isSameKernel) return;
    this.#rebuild();
    // As if it had been at rest where it is: a slow filter would take the slope of its last frames for a start.
    const [, f1, f2, f3] = kernel.feedback;
    const held = this.#held;
    held[3] = held[2];
    held[1] = held[2] * (1 - f2 - f3);
    held[0] = held[1] * (1 - f1);
  }

  /** Another step word: what is added once the next entry has come. The accumulator goes on from where it is. */
  setStepWord(stepWord: number): void {
    if (this.#drive.kind !== 'accumulator') throw new TypeError('Only an accumulator has a step word.');
    if (!(Number.isInteger(stepWord) && stepWord >= 1 && stepWord < this.#modulus)) {
      throw new RangeError(`Step word ${stepWord}: a whole number from 1 to ${this.#modulus - 1}.`);
    }
    this.#step = stepWord;
  }

  /** Another sample rate; of the entry that is being held the same share is left. */
  setSampleRate(hz: number): void {
    checkRate(hz);
    const period = this.#contextRateHz / hz;
    if (Number.isFinite(this.#until)) this.#until *= period / this.#period;
    this.#period = period;
  }

  /** Where in the round the pin is, 0 ≤ phase < 1, the part of the entry that has gone by counted in. */
  get phase(): number {
    const entries = Number.isFinite(this.#until) ? this.#until / this.#period : 0;
    const phase = (this.#next - entries * this.#step) / this.#modulus;
    return phase - Math.floor(phase);
  }

  /** Goes to a place in the round, 0 ≤ phase < 1; an accumulator to the next whole number of it. */
  seek(phase: number): void {
    const at = phase * this.#modulus;
    const next = Math.ceil(at - 1e-9);
    this.#next = next % this.#modulus;
    this.#until = (Math.max(0, next - at) / this.#step) * this.#period;
    this.#restFrames = Infinity;
  }

  /** Goes to where another player is: of the same drive exactly, to the bit of an accumulator. */
  follow(other: PinPlayer): void {
    if (this.#modulus !== other.#modulus) return this.seek(other.phase);
    this.#next = other.#next;
    this.#until = (other.#until / other.#period) * this.#period;
    this.#restFrames = other.#restFrames;
  }

  /** Whether a `once` has held its last entry for a period, and that has been heard. */
  get hasEnded(): boolean {
    return this.#restFrames <= 0;
  }

  /** Fills `out[from … to−1]` with the next frames. */
  process(out: Float32Array | Float64Array, from: number, to: number): void {
    if (this.#isSkipping) {
      this.#isSkipping = false;
      this.#rebuild();
    }
    const rises = this.#rises;
    const held = this.#held;
    const { terms, taps, feedback } = this.#kernel;
    // By index: taking a typed array apart makes an iterator.
    const f0 = feedback[0];
    const f1 = feedback[1];
    const f2 = feedback[2];
    const f3 = feedback[3];
    let sum = this.#sum;
    let s = held[0];
    let t = held[1];
    let y = held[2];
    let before = held[3];
    for (let i = from; i < to; i += 1) {
      const frame = this.#frame;
      if (this.#play()) spread(this.#powers, frame, terms, rises, frame, 0, taps);
      sum += rises[frame];
      rises[frame] = 0;
      this.#frame = (frame + 1) & wrap;
      s = sum + f0 * s;
      t = s + f1 * t;
      const next = t + f2 * y + f3 * before;
      before = y;
      y = next;
      out[i] = y;
    }
    this.#sum = sum;
    held[0] = s;
    held[1] = t;
    held[2] = y;
    held[3] = before;
  }

  /**
   * Goes on without being heard, at the cost of the entries alone. When it is heard again it is what it would have been,
   * but for what a stage remembers, which is then kept to the mean level of each frame.
   */
  skip(frames: number): void {
    this.#isSkipping = true;
    const { feedback } = this.#kernel;
    const held = this.#held;
    for (let i = 0; i < frames; i += 1) {
      this.#play();
      // The frame whose edges have half risen by now; Δ·(1 − u)/2 is what an edge does to the mean of its own.
      const middle = (this.#frame - kernelReach) & wrap;
      const power = middle * kernelTerms;
      const mean = this.#levels[(middle - 1) & wrap] + (this.#powers[power] - this.#powers[power + 1]) / 2;
      held[0] = this.#final * mean + feedback[0] * held[0];
      held[1] = held[0] + feedback[1] * held[1];
      const y = held[1] + feedback[2] * held[2] + feedback[3] * held[3];
      held[3] = held[2];
      held[2] = y;
      this.#frame = (this.#frame + 1) & wrap;
    }
  }

  /** Lets the entries of the next frame come and keeps its powers. Answers whether there is an edge in it. */
  #play(): boolean {
    const powers = this.#powers;
    const at = this.#frame * kernelTerms;
    let isStill = true;
    if (this.#until < 1) {
      const values = this.#values;
      const isOnce = this.#drive.kind === 'once';
      const step = this.#step;
      const modulus = this.#modulus;
      const scale = this.#scale;
      const period = this.#period;
      let until = this.#until;
      let next = this.#next;
      let level = this.#level;
      let m0 = 0;
      let m1 = 0;
      let m2 = 0;
      let m3 = 0;
      let m4 = 0;
      let m5 = 0;
      let m6 = 0;
      let m7 = 0;
      let m8 = 0;
      do {
        const value = values[Math.floor(next * scale)];
        if (value !== level) {
          const edge = value - level;
          const u = 2 * until - 1;
          const uu = u * u;
          const odd = edge * u;
          const u4 = uu * uu;
          const edge4 = edge * u4;
          const odd4 = odd * u4;
          m0 += edge;
          m1 += odd;
          m2 += edge * uu;
          m3 += odd * uu;
          m4 += edge4;
          m5 += odd4;
          m6 += edge4 * uu;
          m7 += odd4 * uu;
          m8 += edge4 * u4;
          level = value;
          isStill = false;
        }
        next += step;
        until += period;
        if (next >= modulus) {
          if (isOnce) {
            this.#restFrames = until + this.#kernel.taps;
            next = modulus - 1;
            until = Infinity;
          } else next -= modulus;
        }
      } while (until < 1);
      this.#until = until;
      this.#next = next;
      this.#level = level;
      powers[at] = m0;
      powers[at + 1] = m1;
      powers[at + 2] = m2;
      powers[at + 3] = m3;
      powers[at + 4] = m4;
      powers[at + 5] = m5;
      powers[at + 6] = m6;
      powers[at + 7] = m7;
      powers[at + 8] = m8;
    }
    if (isStill) powers.fill(0, at, at + kernelTerms);
    this.#until -= 1;
    this.#restFrames -= 1;
    this.#levels[this.#frame] = this.#level;
    return !isStill;
  }

  /** Makes sum and rises anew from what is kept. */
  #rebuild(): void {
    const { terms, taps } = this.#kernel;
    const rises = this.#rises;
    rises.fill(0);
    let sum = this.#final * this.#levels[(this.#frame - taps) & wrap];
    for (let ago = taps - 1; ago >= 1; ago -= 1) {
      const frame = (this.#frame - ago) & wrap;
      // What is to come of it, and what it has risen to by now.
      spread(this.#powers, frame, terms, rises, frame, ago, taps);
      spread(this.#powers, frame, terms, this.#risen, 0, 0, ago);
      for (let j = 0; j < ago; j += 1) {
        sum += this.#risen[j];
        this.#risen[j] = 0;
      }
    }
    this.#sum = sum;
  }
}

/** Adds the rises `first … end−1` of the edges of one frame, whose powers are kept at `frame`, to a ring from `place` on. */
function spread(
  powers: Float64Array,
  frame: number,
  terms: Float64Array,
  ring: Float64Array,
  place: number,
  first: number,
  end: number,
): void {
  const at = frame * kernelTerms;
  const m0 = powers[at];
  const m1 = powers[at + 1];
  const m2 = powers[at + 2];
  const m3 = powers[at + 3];
  const m4 = powers[at + 4];
  const m5 = powers[at + 5];
  const m6 = powers[at + 6];
  const m7 = powers[at + 7];
  const m8 = powers[at + 8];
  for (let j = first, c = first * kernelTerms; j < end; j += 1, c += kernelTerms) {
    ring[(place + j) & wrap] +=
      m0 * terms[c] +
      m1 * terms[c + 1] +
      m2 * terms[c + 2] +
      (m3 * terms[c + 3] + m4 * terms[c + 4] + m5 * terms[c + 5]) +
      (m6 * terms[c + 6] + m7 * terms[c + 7] + m8 * terms[c + 8]);
  }
}

function checkRate(hz: number): void {
  if (!(hz > 0 && hz <= pinRateHzAtMost)) {
    throw new RangeError(`Sample rate ${hz} Hz: above 0 and at most ${pinRateHzAtMost / 1e6} MHz.`);
  }
}
