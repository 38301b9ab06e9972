import type { PitchGrid, SoundProgram } from './player-messages.ts';
import type { Score, Sound } from './sound.ts';

export interface PrepareJob {
  readonly id: number;
  readonly sound: Sound;
  readonly score: Score | null;
  readonly rateHz: number;
  /** Whether the whole sound is made ready, or grids of the score's pitches alone. */
  readonly isWhole: boolean;
}

export interface PrepareReply {
  readonly id: number;
  readonly program?: SoundProgram;
  readonly grids?: Record<string, PitchGrid[]> | null;
  /** What went wrong, in words. */
  readonly trouble?: string;
}
