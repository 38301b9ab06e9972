import type { PulsePattern } from '../../../shared/contract/index.ts';
import { patternText } from '../../../shared/firmware/index.ts';
import { askPython } from '../numpy/python.ts';
import { exported, tone } from '../support/tables.ts';

/** A pattern that its exports are proven on, and how many milliseconds of it. */
export interface PatternCase {
  readonly title: string;
  readonly pattern: PulsePattern;
  readonly ticks: number;
}

const step = (onMs: number, offMs: number, repeats = 1) => ({ onMs, offMs, repeats });

/** Constants of Numerical Recipes' quick generator (Press et al., 3rd ed., §7.1). */
function generator(seed: number): (below: number) => number {
  let state = seed >>> 0;
  return (below) => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return Math.floor((state / 2 ** 32) * below);
  };
}

/** Short and long steps, a quarter of them without a pause. */
export function randomPattern(seed: number, mostSteps = 64): PulsePattern {
  const below = generator(seed);
  const steps = Array.from({ length: 1 + below(mostSteps) }, () =>
    step(1 + below(300), below(4) === 0 ? 0 : below(200), 1 + below(6)),
  );
  return { steps, endless: below(2) === 0 };
}

const runsTogether = Array.from({ length: 64 }, (_, k) =>
  step(1 + (k % 7), k % 3 === 0 ? 0 : k % 5, 1 + (k % 4)),
);

/** What a program has time for: a pass and what comes behind it, or several passes. */
const timeFor = ({ steps, endless }: PulsePattern) => {
  const pass = steps.reduce((sum, { onMs, offMs, repeats }) => sum + (onMs + offMs) * repeats, 0);
  return endless ? Math.max(Math.ceil(pass * 2.5), 40) : pass + 300;
};

const caseOf = (title: string, steps: PulsePattern['steps'], endless: boolean): PatternCase => {
  const pattern = { steps, endless };
  return { title, pattern, ticks: timeFor(pattern) };
};

/** Patterns at the edges of what is allowed. */
export const patternCases: readonly PatternCase[] = [
  caseOf('two short, one long, once', [step(200, 100, 2), step(500, 0)], false),
  caseOf('two short, one long, endless', [step(200, 100, 2), step(500, 400)], true),
  caseOf('1 ms without a pause, endless', [step(1, 0)], true),
  caseOf('1 ms on, 1 ms off, 255 times', [step(1, 1, 255)], false),
  caseOf('64 steps, some without a pause', runsTogether, false),
  caseOf('64 steps, endless', runsTogether, true),
  caseOf('last pulse into the first, endless', [step(3, 2, 3), step(4, 0, 2)], true),
];

/** The longest times, which take a while. */
export const longCase = caseOf('60 s on, 60 s off', [step(60_000, 60_000)], false);

export const randomCases = (count: number, mostSteps?: number): PatternCase[] =>
  Array.from({ length: count }, (_, k) => {
    const pattern = randomPattern(20_261 + k, mostSteps);
    return { title: `random pattern ${k}`, pattern, ticks: timeFor(pattern) };
  });

/** Milliseconds at which it changes whether the tone sounds: by a Python program that knows what a pattern means. */
export const edgesInPython = (cases: readonly Pick<PatternCase, 'pattern' | 'ticks'>[]) =>
  askPython<number[][]>('pulses.py', { cases });

/** The files of a short table with a pattern beside it. */
export const exportedWith = (
  pattern: PulsePattern,
  target: string,
  arrayName: string,
  options: object = {},
) => exported(tone({ length: 16 }), target, { arrayName, pulses: patternText(pattern), ...options }).files;
