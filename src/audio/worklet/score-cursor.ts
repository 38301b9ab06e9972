import type { Score, ScoreEvent } from '../../../shared/listening/sound.ts';

/** Goes through a score by frames of the context's clock. Events keep the score's order. */
export class ScoreCursor {
  readonly #rateHz: number;
  #events: readonly ScoreEvent[] = [];
  /** 0 where the score is played once. */
  #repeatSeconds = 0;
  #origin = 0;
  #next = 0;
  #rounds = 0;
  /** Frame at which the next event takes effect; Infinity where none is left. */
  nextFrame = Infinity;

  constructor(rateHz: number) {
    this.#rateHz = rateHz;
  }

  /** @param origin frame at which the score begins */
  begin(score: Score | null, origin: number): void {
    this.#origin = origin;
    this.#next = 0;
    this.#rounds = 0;
    // What repeats within a frame would repeat for ever in it.
    const repeat = score?.repeatSeconds ?? 0;
    this.#repeatSeconds = repeat * this.#rateHz >= 1 ? repeat : 0;
    this.#events = score?.events ?? [];
    this.#settle();
  }

  /** The event at `nextFrame`; the cursor goes on. */
  take(): ScoreEvent {
    const event = this.#events[this.#next];
    this.#next += 1;
    this.#settle();
    return event;
  }

  #settle(): void {
    const repeat = this.#repeatSeconds;
    const isOver = () =>
      this.#next >= this.#events.length || (repeat > 0 && this.#events[this.#next].atSeconds >= repeat);
    if (isOver() && repeat > 0) {
      this.#next = 0;
      this.#rounds += 1;
    }
    this.nextFrame = isOver()
      ? Infinity
      : Math.round(
          this.#origin + (this.#rounds * repeat + this.#events[this.#next].atSeconds) * this.#rateHz,
        );
  }
}
