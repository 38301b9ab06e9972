import { z } from 'zod';
import { limits } from './limits.ts';
import { oneWordOf, wholeNumberIn } from './number-fields.ts';
import { outputLimits } from './output-limits.ts';
import { problemsIn } from './parse-definition.ts';
import { Refusal, showValue, type Problem } from './refusal.ts';

export const distributions = ['uniform', 'normal'] as const;
export type Distribution = (typeof distributions)[number];

const toleranceError = 'a number of percent from 0 up to, not including, 100';
/** ± share of the nominal resistance, in percent. */
export const tolerancePercentField = z
  .number({ error: toleranceError })
  .min(0, { error: toleranceError })
  .lt(100, { error: toleranceError });

/** How many ladders are built by chance, and from what resistors. */
export const trialSettingsSchema = z.strictObject({
  trials: wholeNumberIn(outputLimits.trials).default(10_000),
  seed: wholeNumberIn(limits.seed).default(1),
  tolerancePercent: tolerancePercentField,
  distribution: oneWordOf(distributions).default('uniform'),
});
export type TrialSettings = z.infer<typeof trialSettingsSchema>;
export type TrialSettingsInput = z.input<typeof trialSettingsSchema>;

/** @throws {Refusal} naming each field at fault, its value and what is allowed. */
export function parseTrialSettings(input: unknown): TrialSettings {
  const parsed = trialSettingsSchema.safeParse(input);
  const [first, ...others] = parsed.success
    ? brokenTrialRules(parsed.data)
    : problemsIn(parsed.error.issues, input, 'trials');
  if (first !== undefined) throw new Refusal(first, ...others);
  return parsed.data as TrialSettings;
}

/** Resistors drawn normally must stay above 0 Ω. */
export function brokenTrialRules(
  { tolerancePercent, distribution }: Pick<TrialSettings, 'tolerancePercent' | 'distribution'>,
  prefix = '',
): Problem[] {
  const most = outputLimits.normalTolerancePercent;
  if (distribution !== 'normal' || tolerancePercent <= most) return [];
  return [
    {
      path: `${prefix}tolerancePercent`,
      value: showValue(tolerancePercent),
      allowed: `at most ${most} while ${prefix}distribution is "normal"`,
    },
  ];
}
