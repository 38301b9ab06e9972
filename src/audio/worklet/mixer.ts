import type { Score, ScoreEvent } from '../../../shared/listening/sound.ts';
import { pinDelayFrames } from '../../../shared/listening/kernel-shape.ts';
import type { PlayerMessage } from '../player-messages.ts';
import { Layer } from './layer.ts';
import { nothingPerformed, type Performed } from './performed.ts';
import { Ramp, rampCurve } from './ramp.ts';
import { ScoreCursor } from './score-cursor.ts';

/** Length of a crossfade between two voices, or between a sound and its change. */
const crossfadeSeconds = 0.012;
/** Length of the ramp with which the gate opens and closes. */
const gateSeconds = 0.005;

/**
 * All that the audio thread does: voices in step, going over from one to another and from a sound to its change, and the
 * score, by frames of the context's clock. Free of the browser, so that it can be tested and run anywhere.
 */
export class Mixer {
  readonly #rateHz: number;
  readonly #crossfade: Float64Array;
  /** The last one is what sounds; those before it give way. */
  readonly #layers: Layer[] = [];
  readonly #gate: Ramp;
  /** Pins come late, so that the score is read twice: once for them, and once for all else. */
  readonly #ahead: ScoreCursor;
  readonly #now: ScoreCursor;
  #performedAhead = nothingPerformed;
  #performedNow = nothingPerformed;
  #hearing = '';
  #request = 0;
  #scratch = new Float32Array(0);
  #gains = new Float64Array(0);

  constructor(rateHz: number) {
    this.#rateHz = rateHz;
    this.#crossfade = rampCurve(crossfadeSeconds, rateHz);
    this.#gate = new Ramp(rampCurve(gateSeconds, rateHz), 1);
    this.#ahead = new ScoreCursor(rateHz);
    this.#now = new ScoreCursor(rateHz);
  }

  /** @param frame of the context's clock that is made next */
  take(message: PlayerMessage, frame: number): void {
    switch (message.kind) {
      case 'start':
        return this.#start(message, frame);
      case 'change':
        if (this.#layers.length > 0) this.#goOver(message.program, this.#layers[this.#layers.length - 1]);
        return;
      case 'hear':
        this.#hearing = message.hearing;
        return this.#layers.at(-1)?.hear(message.hearing);
      case 'perform':
        this.#layers.at(-1)?.addGrids(message.grids);
        if (message.score === null) this.#performNothing();
        return this.#beginScore(message.score, frame);
      case 'stop':
        this.#layers.length = 0;
        this.#beginScore(null, frame);
    }
  }

  /**
   * Fills a block.
   *
   * @param frame of the context's clock with which it begins
   * @returns the request whose pass is over with it; else `null`
   */
  process(out: Float32Array, frame: number): number | null {
    out.fill(0);
    if (this.#layers.length === 0) return null;
    if (this.#scratch.length < out.length) {
      this.#scratch = new Float32Array(out.length);
      this.#gains = new Float64Array(out.length);
    }
    for (let from = 0; from < out.length;) {
      this.#performUpTo(frame + from);
      const next = Math.min(this.#ahead.nextFrame, this.#now.nextFrame);
      const to = Math.min(out.length, next - frame);
      this.#render(out, from, to);
      from = to;
    }
    return this.#clear();
  }

  #start({ program, hearing, score, request }: PlayerMessage & { kind: 'start' }, frame: number): void {
    this.#hearing = hearing;
    this.#request = request;
    this.#performedAhead = this.#performedNow = nothingPerformed;
    const isSilent = this.#layers.length === 0;
    this.#openGate(true, isSilent);
    this.#beginScore(score, frame);
    // What the score begins with applies from the first frame on.
    while (this.#ahead.nextFrame <= frame)
      this.#performedAhead = after(this.#performedAhead, this.#ahead.take());
    while (this.#now.nextFrame <= frame + pinDelayFrames) {
      const event = this.#now.take();
      this.#performedNow = after(this.#performedNow, event);
      if (event.gate !== undefined) this.#openGate(event.gate, isSilent);
    }
    this.#goOver(program, null);
  }

  #goOver(program: (PlayerMessage & { kind: 'change' })['program'], before: Layer | null): void {
    const layer = new Layer(program, this.#rateHz, this.#crossfade, {
      after: before,
      hearing: this.#hearing,
      now: this.#performedNow,
      ahead: this.#performedAhead,
    });
    if (this.#layers.length > 0) {
      layer.ramp.jump(0);
      layer.ramp.go(1);
      for (const other of this.#layers) other.ramp.go(0);
    }
    this.#layers.push(layer);
  }

  /** Pins are told with this frame what is heard of them, as of all else, `pinDelayFrames` later. */
  #beginScore(score: Score | null, frame: number): void {
    this.#ahead.begin(score, frame);
    this.#now.begin(score, frame + pinDelayFrames);
  }

  #openGate(isOpen: boolean, isAtOnce: boolean): void {
    if (isAtOnce) this.#gate.jump(isOpen ? 1 : 0);
    else this.#gate.go(isOpen ? 1 : 0);
  }

  #performNothing(): void {
    this.#performedAhead = this.#performedNow = nothingPerformed;
    this.#layers.at(-1)?.performAhead(nothingPerformed);
    this.#layers.at(-1)?.performNow(nothingPerformed);
    this.#gate.go(1);
  }

  /** Does what the score has for a frame and those before it. */
  #performUpTo(frame: number): void {
    const layer = this.#layers[this.#layers.length - 1];
    while (this.#ahead.nextFrame <= frame) {
      this.#performedAhead = after(this.#performedAhead, this.#ahead.take());
      layer.performAhead(this.#performedAhead);
    }
    while (this.#now.nextFrame <= frame) {
      const event = this.#now.take();
      this.#performedNow = after(this.#performedNow, event);
      layer.performNow(this.#performedNow);
      if (event.gate !== undefined) this.#gate.go(event.gate ? 1 : 0);
    }
  }

  #render(out: Float32Array, from: number, to: number): void {
    for (const layer of this.#layers) layer.render(out, from, to, this.#scratch, this.#gains);
    const gains = this.#gains;
    if (this.#gate.isSteady && this.#gate.target === 1) return;
    gains.fill(1, from, to);
    this.#gate.scale(gains, from, to);
    this.#gate.skip(to - from);
    for (let i = from; i < to; i += 1) out[i] *= gains[i];
  }

  /** Forgets what has given way or ended. */
  #clear(): number | null {
    const last = this.#layers[this.#layers.length - 1];
    const hasEnded = last.hasEnded;
    let kept = 0;
    for (const layer of this.#layers) if (!layer.isOver) this.#layers[kept++] = layer;
    this.#layers.length = kept;
    return hasEnded ? this.#request : null;
  }
}

function after(performed: Performed, { toneHz, stepWord }: ScoreEvent): Performed {
  if (toneHz === undefined && stepWord === undefined) return performed;
  return { toneHz: toneHz ?? performed.toneHz, stepWord: stepWord ?? performed.stepWord };
}
