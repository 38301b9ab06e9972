import type { Board } from '../contract/index.ts';
import { portMapTexts } from './port-map.ts';
import type { Target } from './target.ts';

/** Options of a target that a board stands for: its clock and, of a ladder on ports, the map of its pins. */
export function boardOptionsFor(
  { options }: Pick<Target, 'options'>,
  { clock, output }: Board,
): Readonly<Record<string, string>> {
  const all = {
    ...(Number.isInteger(clock.hz) ? { clockHz: String(clock.hz) } : {}),
    ...(output.kind === 'ladder' ? portMapTexts(output.portMap) : {}),
  };
  return Object.fromEntries(Object.entries(all).filter(([name]) => name in options.shape));
}
