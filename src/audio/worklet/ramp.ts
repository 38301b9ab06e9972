/**
 * A gain on its way along half a period of a raised cosine. Several that set out together keep a constant sum, so that
 * a crossfade of waves in phase has no dip; one that is turned round on its way goes on from where it is.
 */
export class Ramp {
  #from: number;
  #to: number;
  #at = 0;
  readonly #curve: Float64Array;

  /** @param curve of `rampCurve` */
  constructor(curve: Float64Array, value: number) {
    this.#curve = curve;
    this.#from = this.#to = value;
    this.#at = curve.length;
  }

  /** What it is on its way to, or is. */
  get target(): number {
    return this.#to;
  }

  get value(): number {
    return this.#at >= this.#curve.length
      ? this.#to
      : this.#from + (this.#to - this.#from) * this.#curve[this.#at];
  }

  get isSteady(): boolean {
    return this.#at >= this.#curve.length;
  }

  get isSilent(): boolean {
    return this.#to === 0 && this.isSteady;
  }

  /** Sets out for a value. Several that keep a constant sum set out together, those that stay as well. */
  go(to: number): void {
    this.#from = this.value;
    this.#to = to;
    this.#at = this.#from === to ? this.#curve.length : 0;
  }

  jump(to: number): void {
    this.#from = this.#to = to;
    this.#at = this.#curve.length;
  }

  /** Multiplies `gains[from … to − 1]` by the next values, without going on. */
  scale(gains: Float64Array, from: number, to: number): void {
    const curve = this.#curve;
    let i = from;
    for (let at = this.#at; i < to && at < curve.length; i += 1, at += 1) {
      gains[i] *= this.#from + (this.#to - this.#from) * curve[at];
    }
    if (this.#to !== 1) for (; i < to; i += 1) gains[i] *= this.#to;
  }

  /** Goes on. */
  skip(frames: number): void {
    this.#at = Math.min(this.#curve.length, this.#at + frames);
  }
}

/** How far a ramp has come in each of its frames, 0…1. */
export function rampCurve(seconds: number, rateHz: number): Float64Array {
  const frames = Math.max(1, Math.round(seconds * rateHz));
  return Float64Array.from({ length: frames }, (_, i) => 0.5 - 0.5 * Math.cos((Math.PI * (i + 1)) / frames));
}
