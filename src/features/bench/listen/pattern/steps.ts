import { pulseLimits, type PulseStep } from '../../../../../shared/contract/index.ts';

export type Steps = readonly PulseStep[];

export const isFull = (steps: Steps) => steps.length >= pulseLimits.steps.max;

export const setStep = (steps: Steps, index: number, part: Partial<PulseStep>): PulseStep[] =>
  steps.map((step, k) => (k === index ? { ...step, ...part } : step));

/** The step once more, behind itself. */
export const repeatStep = (steps: Steps, index: number): PulseStep[] =>
  steps.flatMap((step, k) => (k === index ? [step, { ...step }] : [step]));

export const removeStep = (steps: Steps, index: number): PulseStep[] => steps.filter((_, k) => k !== index);

/** A list with one of its items in another place. */
export function moved<Item>(items: readonly Item[], from: number, to: number): Item[] {
  const others = items.filter((_, k) => k !== from);
  others.splice(to, 0, items[from]);
  return others;
}
