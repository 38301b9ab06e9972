import { z } from 'zod';
import { shortListOf, type Bounds } from './number-fields.ts';
import { problemsIn } from './parse-definition.ts';
import { Refusal } from './refusal.ts';

/** What a pattern of pulses may hold: times fit 16 bits, repeats 8, so that firmware keeps a step in five bytes. */
export const pulseLimits = {
  steps: { min: 1, max: 64 },
  onMs: { min: 1, max: 60_000 },
  offMs: { min: 0, max: 60_000 },
  repeats: { min: 1, max: 255 },
} as const satisfies Record<string, Bounds>;

const milliseconds = ({ min, max }: Bounds) => {
  const error = `a whole number from ${min} to ${max}, in milliseconds`;
  return z.int({ error }).min(min, { error }).max(max, { error });
};

const repeatsError = `a whole number from ${pulseLimits.repeats.min} to ${pulseLimits.repeats.max}`;

/** One step: it sounds for `onMs`, pauses for `offMs`, and that `repeats` times; whole milliseconds. */
export const pulseStepSchema = z.strictObject(
  {
    onMs: milliseconds(pulseLimits.onMs),
    offMs: milliseconds(pulseLimits.offMs),
    repeats: z
      .int({ error: repeatsError })
      .min(pulseLimits.repeats.min, { error: repeatsError })
      .max(pulseLimits.repeats.max, { error: repeatsError }),
  },
  { error: 'a step with onMs, offMs and repeats' },
);
export type PulseStep = z.infer<typeof pulseStepSchema>;

/**
 * When a tone sounds and when it pauses: its steps one after the other, from the first again where it is `endless`;
 * silent behind the last where not. Without a pause (`offMs` 0) a pulse runs into the next.
 */
export const pulsePatternSchema = z.strictObject(
  {
    steps: shortListOf(pulseStepSchema, pulseLimits.steps, 'steps'),
    endless: z.boolean({ error: 'true or false' }),
  },
  { error: 'a pattern with steps and endless' },
);
export type PulsePattern = z.infer<typeof pulsePatternSchema>;

/** @throws {Refusal} naming each field at fault as `pattern.steps[3].onMs`, its value and what is allowed */
export function parsePulsePattern(input: unknown): PulsePattern {
  const result = pulsePatternSchema.safeParse(input);
  if (result.success) return result.data;
  const issues = result.error.issues.map((issue) => ({ ...issue, path: ['pattern', ...issue.path] }));
  const [first, ...others] = problemsIn(issues, { pattern: input });
  throw new Refusal(first, ...others);
}

/** Milliseconds of one pass, pauses included: at most 1,958,400,000, which 31 bits hold. */
export function patternMs({ steps }: PulsePattern): number {
  return steps.reduce((sum, { onMs, offMs, repeats }) => sum + (onMs + offMs) * repeats, 0);
}
