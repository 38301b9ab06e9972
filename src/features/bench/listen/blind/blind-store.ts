import type { BlindRun, Drive, Matched, Voice } from '../../../../../shared/listening/index.ts';
import { createLive } from '../../../../live/index.ts';
import { choiceOf, type SideChoice } from './side-choice.ts';

/** The two before they are brought to one loudness. */
export interface Pair {
  readonly a: Voice;
  readonly b: Voice;
  readonly drive: Drive;
}

export type Loudness = Extract<Matched, { kind: 'matched' }>;

/** What a run is about. */
interface Subject {
  readonly words: { readonly a: string; readonly b: string };
  /** Name of the wave on the bench. */
  readonly wave: string;
  readonly loudness: Loudness;
}

export interface RunningTest extends Subject {
  readonly run: BlindRun;
  /** As it was when the run began, whatever the bench does meanwhile. */
  readonly pair: Pair;
  readonly hears: 'a' | 'b' | 'x';
  /** Whether X was heard in this trial. */
  readonly hasHeardX: boolean;
}

export interface FinishedTest extends Subject {
  readonly id: number;
  readonly run: BlindRun;
}

export interface BlindState {
  readonly a: SideChoice;
  readonly b: SideChoice;
  readonly trials: number;
  readonly running: RunningTest | null;
  /** Newest first. */
  readonly finished: readonly FinishedTest[];
}

/** Outlives the panel, so that a run goes on when it is closed and opened again. */
export const blindStore = createLive<BlindState>({
  a: choiceOf('ideal'),
  b: choiceOf('table'),
  trials: 16,
  running: null,
  finished: [],
});

export function changeBlind(part: Partial<BlindState>): void {
  blindStore.set({ ...blindStore.now(), ...part });
}

/** Takes up a run that has moved on; one that is over goes to the finished ones. */
export function moveOn(test: RunningTest): void {
  if (test.run.end === 'open') return changeBlind({ running: test });
  const { run, words, wave, loudness } = test;
  const { finished } = blindStore.now();
  const id = (finished[0]?.id ?? 0) + 1;
  changeBlind({ running: null, finished: [{ id, run, words, wave, loudness }, ...finished] });
}
