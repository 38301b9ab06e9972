import { Refusal } from '../../../../../shared/contract/index.ts';
import {
  bentHz,
  glideEvents,
  glideHzAt,
  glideSteps,
  noteHz,
  noteName,
  planTone,
  pressNote,
  releaseNote,
  releaseNotesOf,
  soundingNote,
  type GlideStep,
  type HeldNotes,
  type ToneDrive,
  type ToneSetting,
} from '../../../../../shared/listening/index.ts';
import type { Score } from '../../../../../shared/listening/sound.ts';
import { createLive, type Live } from '../../../../live/index.ts';

export interface NoteSettings {
  readonly drive: ToneDrive;
  readonly a4Hz: number;
  /** From a note that is held to the next. */
  readonly portamentoMs: number;
}

export interface Performance {
  readonly held: HeldNotes;
  /** What sounds; null where nothing does. */
  readonly sounding: number | null;
  /** The one that was pressed or looked at last. */
  readonly atHand: number;
  /** In semitones. */
  readonly bend: number;
  /** Why a note was not played, in words for the screen. */
  readonly fault: string | null;
}

/** Time between two updates of a glide from note to note: a firmware's tick of 1 ms (common practice, no source). */
const tickSeconds = 0.001;

export const silence: Score = { events: [{ atSeconds: 0, gate: false }] };

/** Turns what is pressed into scores of one tone at a time: the last note pressed, as the part would make it. */
export class NotePerformer {
  readonly #state;
  readonly #now: () => number;
  #settings: NoteSettings;
  #score: Score = silence;
  /** What sounds of late, and when it began. */
  #steps: readonly GlideStep[] | null = null;
  #begunMs = 0;
  #lastSetting: ToneSetting | null = null;
  #onScore: (score: Score) => void = () => undefined;

  /** @param now a clock in milliseconds */
  constructor(settings: NoteSettings, atHand: number, now: () => number) {
    this.#settings = settings;
    this.#now = now;
    this.#state = createLive<Performance>({ held: [], sounding: null, atHand, bend: 0, fault: null });
  }

  get state(): Live<Performance> {
    return this.#state;
  }

  /** Tells one listener of every new score. */
  tell(onScore: (score: Score) => void): void {
    this.#onScore = onScore;
  }

  /** What is to sound now. */
  get score(): Score {
    return this.#score;
  }

  /** A holder presses a note, or goes over to it. Answers whether it can be played. */
  press(holder: string, note: number): boolean {
    const fault = this.whyNot(note);
    if (fault !== null) {
      this.#become({ atHand: note, fault });
      return false;
    }
    const before = this.#state.now();
    this.#become({ held: pressNote(before.held, holder, note), atHand: note, fault: null });
    // Two fingers on one note are one note.
    if (before.sounding !== note) this.#sound(true);
    return true;
  }

  release(holder: string): void {
    this.#letGo(releaseNote(this.#state.now().held, holder));
  }

  /** Lets go of every holder whose name begins so. */
  releaseOf(beginning: string): void {
    this.#letGo(releaseNotesOf(this.#state.now().held, beginning));
  }

  releaseAll(): void {
    this.#letGo([]);
  }

  /** Forgets what is held without telling anybody: the sound is another's now. */
  forget(): void {
    this.#steps = null;
    this.#score = silence;
    this.#become({ held: [], sounding: null });
  }

  lookAt(note: number): void {
    this.#become({ atHand: note });
  }

  bend(semitones: number): void {
    if (semitones === this.#state.now().bend) return;
    this.#become({ bend: semitones });
    if (this.#state.now().sounding !== null) this.#sound(false);
  }

  /** Another way of making notes, tuning or portamento; what sounds goes over to it. */
  set(settings: NoteSettings): void {
    const { drive, a4Hz } = this.#settings;
    this.#settings = settings;
    if (drive === settings.drive && a4Hz === settings.a4Hz) return;
    this.#become({ fault: null });
    if (this.#state.now().sounding !== null) this.#sound(false);
  }

  /** Plays a score of its own; what is held is let go. */
  perform(score: Score): void {
    this.#steps = null;
    this.#become({ held: [], sounding: null, fault: null });
    this.#give(score);
  }

  /** Why a note cannot be played by the part, in words for the screen. */
  whyNot(note: number): string | null {
    try {
      planTone(this.#settings.drive, noteHz(note, this.#settings.a4Hz));
      return null;
    } catch (error) {
      return `${noteName(note)} is not played. ${sayRefusal(error)}`;
    }
  }

  #letGo(held: HeldNotes): void {
    if (held === this.#state.now().held) return;
    const before = soundingNote(this.#state.now().held);
    this.#become({ held });
    if (soundingNote(held) !== before) this.#sound(true);
  }

  #sound(mayGlide: boolean): void {
    const { held, bend } = this.#state.now();
    const note = soundingNote(held);
    if (note === null) {
      this.#steps = null;
      this.#become({ sounding: null });
      this.#give({ events: [{ atSeconds: 0, gate: false, ...this.#lastSetting }] });
      return;
    }
    const { drive, a4Hz } = this.#settings;
    try {
      const wantedHz = bentHz(noteHz(note, a4Hz), bend);
      const steps = (mayGlide ? this.#glideTo(wantedHz) : null) ?? stepTo(drive, wantedHz);
      this.#steps = steps;
      this.#begunMs = this.#now();
      this.#lastSetting = settingAt(steps[steps.length - 1]);
      this.#become({ sounding: note, atHand: note });
      this.#give({ events: glideEvents(steps) });
    } catch (error) {
      // A bend or another way of making notes has taken it out of reach.
      this.#become({ held: [], fault: `${noteName(note)} is not played. ${sayRefusal(error)}` });
      this.#sound(false);
    }
  }

  /** From what sounds at this moment. */
  #glideTo(toHz: number): readonly GlideStep[] | null {
    const { drive, portamentoMs } = this.#settings;
    if (portamentoMs === 0 || this.#steps === null) return null;
    const fromHz = glideHzAt(this.#steps, (this.#now() - this.#begunMs) / 1000);
    return glideSteps(drive, {
      fromHz,
      toHz,
      seconds: portamentoMs / 1000,
      updateSeconds: tickSeconds,
      path: 'exponential',
    });
  }

  #give(score: Score): void {
    this.#score = score;
    this.#onScore(score);
  }

  #become(part: Partial<Performance>): void {
    this.#state.set({ ...this.#state.now(), ...part });
  }
}

function stepTo(drive: ToneDrive, wantedHz: number): readonly GlideStep[] {
  const { playedHz, word, setting } = planTone(drive, wantedHz);
  return [{ atSeconds: 0, hz: playedHz, word, ...setting }];
}

function settingAt(step: GlideStep): ToneSetting {
  return 'stepWord' in step ? { stepWord: step.stepWord } : { toneHz: step.toneHz };
}

function sayRefusal(error: unknown): string {
  if (!(error instanceof Refusal)) throw error;
  const [{ value, allowed }] = error.problems;
  return `${value} is out of reach. Allowed: ${allowed}.`;
}
