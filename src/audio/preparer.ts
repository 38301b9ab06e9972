import type { Score, ScoreEvent, Sound } from './sound.ts';
import type { PitchGrid, SoundProgram } from './player-messages.ts';
import { prepareGrids, prepareSound, workOf } from './prepare-sound.ts';
import type { PrepareJob, PrepareReply } from './prepare-messages.ts';

/** What is made on the page's own thread, in units of `workOf`: some 4 ms. */
const workHere = 40_000;
/** Pitches whose grids the audio thread is taken to hold still. */
const pitchesKept = 128;

/** Of a score that another takes the place of, at most so many last pitches count as what may sound. */
const pitchesHeld = 16;

const isPitched = ({ toneHz, stepWord }: ScoreEvent) => toneHz !== undefined || stepWord !== undefined;

type Grids = Record<string, PitchGrid[]>;

/** Makes sounds ready: at once where that is quick, else in a worker. */
export class Preparer {
  readonly #rateHz: number;
  #worker: Worker | null = null;
  #jobs = 0;
  readonly #waiting = new Map<number, (reply: PrepareReply) => void>();
  #score: Score | null = null;
  /** What has set a pitch in the score that plays, and at last before it: what sounds now is one of them. */
  #pitched: readonly ScoreEvent[] = [];
  #pitchedBefore: readonly ScoreEvent[] = [];
  /** Pitches that were performed on a sound: their grids need not be made again. */
  #known: { sound: Sound | null; pitches: Set<number> } = { sound: null, pitches: new Set() };

  constructor(contextRateHz: number) {
    this.#rateHz = contextRateHz;
  }

  /** A sound with the pitches of a score, and of what came before it. Rejects where the worker fails. */
  prepare(sound: Sound, playing: Score | null): SoundProgram | Promise<SoundProgram> {
    this.#follow(playing);
    const score = { events: [...this.#pitchedBefore, ...this.#pitched] };
    this.#known = { sound, pitches: new Set(pitchesIn(score)) };
    if (workOf(sound, score, this.#rateHz) <= workHere) return prepareSound(sound, score, this.#rateHz);
    return this.#ask({ sound, score, rateHz: this.#rateHz, isWhole: true }).then(
      (reply) => reply.program ?? { voices: {} },
    );
  }

  /**
   * Grids of a score's new pitches for a sound that was prepared last.
   *
   * @returns `null` where the sound is to be prepared anew
   */
  gridsFor(sound: Sound, score: Score | null): Grids | null | Promise<Grids | null> {
    this.#follow(score);
    if (score === null) return {};
    const known = this.#known.sound === sound ? this.#known.pitches : new Set<number>();
    const fresh = pitchesIn(score).filter((pitch) => !known.has(pitch));
    if (fresh.length === 0) return {};
    if (known.size + fresh.length > pitchesKept) known.clear();
    for (const pitch of fresh) known.add(pitch);
    this.#known = { sound, pitches: known };
    const events = score.events.filter(({ toneHz, stepWord }) => {
      const pitch = toneHz ?? stepWord;
      return pitch !== undefined && fresh.includes(pitch);
    });
    if (workOf(sound, { events }, this.#rateHz) <= workHere)
      return prepareGrids(sound, { events }, this.#rateHz);
    return this.#ask({ sound, score: { events }, rateHz: this.#rateHz, isWhole: false }).then(
      ({ grids }) => grids ?? null,
    );
  }

  #follow(score: Score | null): void {
    if (score === this.#score) return;
    this.#score = score;
    const pitched = score === null ? [] : score.events.filter(isPitched);
    // A score that sets no pitch leaves it as it was.
    if (score !== null && pitched.length === 0) return;
    this.#pitchedBefore = score === null ? [] : this.#pitched.slice(-pitchesHeld);
    this.#pitched = pitched;
  }

  close(): void {
    this.#worker?.terminate();
    this.#worker = null;
    this.#waiting.clear();
  }

  #ask(job: Omit<PrepareJob, 'id'>): Promise<PrepareReply> {
    this.#worker ??= this.#start();
    const id = (this.#jobs += 1);
    this.#worker.postMessage({ ...job, id } satisfies PrepareJob);
    return new Promise((resolve, reject) => {
      this.#waiting.set(id, (reply) => {
        if (reply.trouble === undefined) resolve(reply);
        else reject(new Error(reply.trouble));
      });
    });
  }

  #start(): Worker {
    const worker = new Worker(new URL('./prepare.worker.ts', import.meta.url), {
      type: 'module',
      name: 'listening',
    });
    worker.onmessage = ({ data }: MessageEvent<PrepareReply>) => {
      this.#waiting.get(data.id)?.(data);
      this.#waiting.delete(data.id);
    };
    worker.onerror = (event) => {
      event.preventDefault();
      worker.terminate();
      this.#worker = null;
      const trouble = event.message || 'The program for it could not be loaded.';
      for (const [id, tell] of this.#waiting) tell({ id, trouble });
      this.#waiting.clear();
    };
    return worker;
  }
}

/** Tones and step words of a score, each once. */
function pitchesIn(score: Score | null): number[] {
  const pitches = new Set<number>();
  for (const { toneHz, stepWord } of score?.events ?? []) {
    if (toneHz !== undefined) pitches.add(toneHz);
    if (stepWord !== undefined) pitches.add(stepWord);
  }
  return [...pitches];
}
