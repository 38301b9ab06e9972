import type { TableSettings } from '../contract/index.ts';

/** Rounds a code position to a whole number, before any clip. */
export type Rounder = (position: number) => number;

const halfUp: Rounder = (position) => Math.floor(position + 0.5);
const down: Rounder = (position) => Math.floor(position);
const halfEven: Rounder = (position) => {
  const below = Math.floor(position);
  const rest = position - below;
  if (rest !== 0.5) return rest < 0.5 ? below : below + 1;
  return below % 2 === 0 ? below : below + 1;
};

export function rounderOf(rounding: TableSettings['rounding']): Rounder {
  return { 'half-up': halfUp, 'half-even': halfEven, down }[rounding];
}
