import type { Score, Sound } from '../../../shared/listening/index.ts';
import type { PlayerMessage } from '../../../src/audio/player-messages.ts';
import { prepareSound } from '../../../src/audio/prepare-sound.ts';
import { Mixer } from '../../../src/audio/worklet/mixer.ts';

export const quantum = 128;
export const rateHz = 48_000;

/** The audio thread's part, run quantum by quantum; what comes out is kept. */
export class Mixed {
  readonly #mixer = new Mixer(rateHz);
  #frame = 0;
  readonly frames: number[] = [];
  /** Requests whose pass was over, and the frame by which it was. */
  readonly ended: [request: number, frame: number][] = [];

  tell(message: PlayerMessage): void {
    this.#mixer.take(message, this.#frame);
  }

  start(sound: Sound, hearing: string, score: Score | null = null): void {
    this.tell({ kind: 'start', program: prepareSound(sound, score, rateHz), hearing, score, request: 7 });
  }

  change(sound: Sound, score: Score | null = null): void {
    this.tell({ kind: 'change', program: prepareSound(sound, score, rateHz) });
  }

  /** Plays on for so many quanta and answers their frames. */
  run(quanta: number): number[] {
    const first = this.#frame;
    for (let i = 0; i < quanta; i += 1) {
      const out = new Float32Array(quantum);
      const ended = this.#mixer.process(out, this.#frame);
      this.#frame += quantum;
      this.frames.push(...out);
      if (ended !== null) this.ended.push([ended, this.#frame]);
    }
    return this.frames.slice(first);
  }
}

/** Amplitude and phase (in turns, of a cosine at frame 0 of all) of a sine, over whole periods of it. */
export function sineIn(
  frames: readonly number[],
  first: number,
  count: number,
  hz: number,
): [number, number] {
  let re = 0;
  let im = 0;
  for (let i = first; i < first + count; i += 1) {
    const window = 1 - Math.cos((2 * Math.PI * (i - first + 0.5)) / count);
    re += (window * frames[i] * Math.cos((2 * Math.PI * hz * i) / rateHz)) / count;
    im -= (window * frames[i] * Math.sin((2 * Math.PI * hz * i) / rateHz)) / count;
  }
  return [2 * Math.hypot(re, im), Math.atan2(im, re) / (2 * Math.PI)];
}
