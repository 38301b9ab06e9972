import type { Pass } from '../../../shared/listening/curve-pass.ts';

/** Plays frames that were made beforehand, once. */
export class PassVoice {
  readonly #frames: Float32Array;
  #next = 0;

  constructor({ frames }: Pass) {
    this.#frames = frames;
  }

  /** Fills `out[from … to − 1]`. */
  render(out: Float32Array, from: number, to: number): void {
    for (let i = from; i < to; i += 1, this.#next += 1) {
      out[i] = this.#next < this.#frames.length ? this.#frames[this.#next] : 0;
    }
  }

  /** Goes on unheard. */
  skip(frames: number): void {
    this.#next += frames;
  }
}
