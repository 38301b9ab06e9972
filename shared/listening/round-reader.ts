import { readRound, type RoundGrid } from './cycle.ts';
import { pinDelayFrames } from './kernel-shape.ts';

/** A round and how often it goes round. Plain data, so that it can be handed to the audio thread. */
export interface RoundProgram extends RoundGrid {
  readonly roundHz: number;
}

const delayLength = 64;
const wrap = delayLength - 1;

/**
 * Plays rounds from a grid, without end: −124 dB of each line besides what the grid holds. It begins at phase 0; the phase
 * goes on through every change of grid and pitch. Frames come `pinDelayFrames` late, so that it is in step with a
 * `PinPlayer` that has been handled alike. Nothing is allocated once it has been made.
 */
export class RoundReader {
  readonly #contextRateHz: number;
  #grid = new Float32Array(0);
  #size = 0;
  #step = 0;
  #phase = 0;
  readonly #delayed = new Float64Array(delayLength);
  #frame = 0;
  #isSkipping = false;

  /** @param contextRateHz frames a second, above 0 */
  constructor(contextRateHz: number) {
    this.#contextRateHz = contextRateHz;
  }

  /** Takes up another round and its pitch. */
  load({ grid, size, roundHz }: RoundProgram): void {
    this.#grid = grid;
    this.#size = size;
    this.setRoundHz(roundHz);
  }

  /** Another pitch of the same round: lines that this takes beyond half the context's rate fold back. */
  setRoundHz(roundHz: number): void {
    if (!(roundHz > 0 && Number.isFinite(roundHz))) throw new RangeError(`Rounds at ${roundHz} Hz: above 0.`);
    this.#step = roundHz / this.#contextRateHz;
  }

  /** Of the next frame, in rounds, 0 ≤ phase < 1. */
  get phase(): number {
    return this.#phase;
  }

  seek(phase: number): void {
    this.#phase = phase - Math.floor(phase);
  }

  /** Fills `out[from … to−1]` with the next frames. */
  process(out: Float32Array | Float64Array, from: number, to: number): void {
    if (this.#isSkipping) this.#catchUp();
    const grid = this.#grid;
    const size = this.#size;
    const step = this.#step;
    const delayed = this.#delayed;
    let phase = this.#phase;
    let frame = this.#frame;
    for (let i = from; i < to; i += 1) {
      out[i] = delayed[(frame - pinDelayFrames) & wrap];
      delayed[frame] = size === 0 ? 0 : readRound(grid, size, phase);
      frame = (frame + 1) & wrap;
      phase += step;
      if (phase >= 1) phase -= Math.floor(phase);
    }
    this.#phase = phase;
    this.#frame = frame;
  }

  /** Goes on without being heard, at no cost. */
  skip(frames: number): void {
    this.#isSkipping = true;
    this.seek(this.#phase + frames * this.#step);
  }

  /** The frames that would have been waiting. */
  #catchUp(): void {
    this.#isSkipping = false;
    for (let ago = 1; ago <= pinDelayFrames; ago += 1) {
      const phase = this.#phase - ago * this.#step;
      this.#delayed[(this.#frame - ago) & wrap] =
        this.#size === 0 ? 0 : readRound(this.#grid, this.#size, phase - Math.floor(phase));
    }
  }
}
