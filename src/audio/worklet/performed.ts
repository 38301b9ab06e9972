import type { Pitch } from '../player-messages.ts';

/** What a score has set so far. */
export interface Performed {
  readonly toneHz: number | null;
  readonly stepWord: number | null;
}

export const nothingPerformed: Performed = { toneHz: null, stepWord: null };

/** Rounds a second of a voice. */
export function loopHzOf(pitch: Pitch, { toneHz, stepWord }: Performed): number {
  if (pitch.by === 'tone') return toneHz === null ? pitch.loopHz : toneHz / pitch.cycles;
  return stepWordOf(pitch, stepWord) * pitch.hzPerStep;
}

/** The step word of a voice, 1 … `highestWord`. */
export function stepWordOf(pitch: Pitch & { by: 'stepWord' }, scored: number | null): number {
  if (scored === null) return pitch.stepWord;
  return Math.min(pitch.highestWord, Math.max(1, Math.round(scored * pitch.perScored)));
}
