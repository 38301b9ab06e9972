import { createLive } from '../../../live/index.ts';
import type { Comma } from '../quantise/levels/read-levels.ts';

export type Measured = 'levels' | 'weights' | 'resistors' | 'board';

export interface FitWishes {
  readonly measured: Measured;
  readonly levels: string;
  readonly levelsComma: Comma | undefined;
  readonly weights: string;
  readonly weightsComma: Comma | undefined;
  readonly rungs: string;
  readonly series: string;
  readonly terminator: string;
  readonly singles: string;
  readonly doubles: string;
}

/** What was typed or dropped in; it stays while the recess is shut. */
export const fitWishes = createLive<FitWishes>({
  measured: 'levels',
  levels: '',
  levelsComma: undefined,
  weights: '',
  weightsComma: undefined,
  rungs: '',
  series: '',
  terminator: '',
  singles: '',
  doubles: '',
});

export const wishFit = (part: Partial<FitWishes>): void => fitWishes.set({ ...fitWishes.now(), ...part });
