import type { Board } from '../contract/index.ts';
import { portMapTexts } from './port-map.ts';

/**
 * Options that a board stands for: its clock and, of a ladder on ports, the map of its pins. A target takes those of
 * them that it has.
 */
export function boardOptions({ clock, output }: Board): Readonly<Record<string, string>> {
  const hasWholeClock = Number.isInteger(clock.hz);
  return {
    ...(hasWholeClock ? { clockHz: String(clock.hz) } : {}),
    ...(output.kind === 'ladder' ? portMapTexts(output.portMap) : {}),
  };
}
