import { z } from 'zod';
import { partOhms, seriesOhms } from './ladder.ts';
import { shortListOf, wholeNumberIn } from './number-fields.ts';
import { outputLimits } from './output-limits.ts';
import { problemsIn } from './parse-definition.ts';
import { Refusal, showValue, type Problem } from './refusal.ts';

/** Measured resistors to build a ladder from. */
export const resistorBagSchema = z.strictObject({
  bits: wholeNumberIn(outputLimits.bits),
  /** Measured ones for R, in Ω: at least `bits − 1`. */
  singles: shortListOf(partOhms, { min: 0, max: outputLimits.bagResistors }, 'resistances'),
  /** Measured ones for 2R, rungs and terminator, in Ω: at least `bits + 1`. */
  doubles: shortListOf(partOhms, { min: 2, max: outputLimits.bagResistors }, 'resistances'),
  /** What each pin adds in series, in Ω, high or low. */
  pinOhms: seriesOhms.default(0),
});
export type ResistorBag = z.infer<typeof resistorBagSchema>;
export type ResistorBagInput = z.input<typeof resistorBagSchema>;

/** @throws {Refusal} naming each field at fault, its value and what is allowed. */
export function parseResistorBag(input: unknown): ResistorBag {
  const parsed = resistorBagSchema.safeParse(input);
  const [first, ...others] = parsed.success
    ? brokenBagRules(parsed.data)
    : problemsIn(parsed.error.issues, input, 'bag');
  if (first !== undefined) throw new Refusal(first, ...others);
  return parsed.data as ResistorBag;
}

function brokenBagRules({ bits, singles, doubles }: ResistorBag): Problem[] {
  const problems: Problem[] = [];
  const needs = (path: string, list: readonly number[], count: number, what: string) => {
    if (list.length < count)
      problems.push({ path, value: showValue(list), allowed: `at least ${count} resistances, ${what}` });
  };
  needs('singles', singles, bits - 1, `one between each two nodes of ${bits} bits`);
  needs('doubles', doubles, bits + 1, 'one for each bit and one for the terminator');
  return problems;
}
