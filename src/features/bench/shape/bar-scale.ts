/** How much the bar field shows from its middle to its top: all, or a closer look at small bars. */
export const reaches = ['all', '0.3', '0.1', '0.03', '0.01'] as const;
export type Reach = (typeof reaches)[number];

const ceilings = [1, 1.5, 2, 3, 5, 7.5];

/** Amplitude at the top of the field: at least 1, and a round number above the strongest partial. */
export function ceilingFor(strongest: number, reach: Reach): number {
  if (reach !== 'all') return Number(reach);
  if (!Number.isFinite(strongest) || strongest <= 1) return 1;
  const decade = 10 ** Math.floor(Math.log10(strongest));
  const round = ceilings.find((ceiling) => ceiling * decade >= strongest);
  return Number(((round ?? 10) * decade).toPrecision(3));
}

/** Share of the field's height that a bar up to the top of the scale takes; the rest is air at both ends. */
export const barShare = 0.46;

/** Steps from the middle of the field to its top that a pointer can set. */
const pointerSteps = 100;

/** A drawn height on the field's grid: a hundredth of its reach, 0.01 where the top is 1. */
export function snapToGrid(amplitude: number, ceiling: number): number {
  const held = Math.min(ceiling, Math.max(-ceiling, amplitude));
  const snapped = (Math.round((held / ceiling) * pointerSteps) * ceiling) / pointerSteps;
  return Number(snapped.toPrecision(6)) + 0;
}

/** Adds a step on the decimal grid of both numbers: 0.1 + 0.2 is 0.3. */
export function addStep(amplitude: number, step: number): number {
  const decimals = (number: number) => /\.(\d+)$/.exec(String(number))?.[1].length ?? 0;
  return Number((amplitude + step).toFixed(Math.min(15, Math.max(decimals(amplitude), decimals(step))))) + 0;
}

/** Level in dB relative to the strongest partial; −∞ for 0. */
export function relativeDb(amplitude: number, strongest: number): number {
  return 20 * Math.log10(Math.abs(amplitude) / strongest);
}

/** Which harmonics get a number under their bar, so that numbers stand at least 22 px apart: 1, 2, 4, 5, 10 … */
export function labelEvery(pitch: number): number {
  const wanted = 22 / pitch;
  for (let decade = 1; ; decade *= 10) {
    for (const step of [1, 2, 4, 5]) if (step * decade >= wanted) return step * decade;
  }
}
