import { z } from 'zod';
import { numberIn, shortListOf, wholeNumberIn } from './number-fields.ts';
import { outputLimits } from './output-limits.ts';
import { problemsIn } from './parse-definition.ts';
import { Refusal, showValue, type Problem } from './refusal.ts';

/** A resistance of a part, in Ω: above 0. */
export const partOhms = numberIn(outputLimits.ohms, 'Ω');
/** A resistance in series that may be left out of account: 0 or more, in Ω. */
export const seriesOhms = numberIn({ min: 0, max: outputLimits.ohms.max }, 'Ω');
export const voltsField = numberIn(outputLimits.volts, 'V');

/** The resistors of an R-2R ladder; those that are not named are R and 2R exactly. */
export const ladderParts = {
  bits: wholeNumberIn(outputLimits.bits),
  /** Nominal resistance between nodes, in Ω; rungs and terminator have twice that. */
  R: partOhms,
  /** Resistance from pin i to node i, in Ω, least significant bit first; `bits` of them. */
  rungs: shortListOf(partOhms, { min: 1, max: outputLimits.bits.max }, 'resistances').optional(),
  /** Resistance from node i to node i + 1, in Ω; `bits − 1` of them. */
  series: shortListOf(partOhms, { min: 0, max: outputLimits.bits.max - 1 }, 'resistances').optional(),
  /** Resistance from node 0 to the low rail, in Ω. */
  terminator: partOhms.optional(),
  /** What a high pin adds in series, in Ω. */
  rHigh: seriesOhms.default(0),
  /** What a low pin adds in series, in Ω. */
  rLow: seriesOhms.default(0),
};

/** A ladder of §6 with its rails and its load. */
export const ladderSchema = z.strictObject({
  ...ladderParts,
  /** Voltage of a high pin without load, in V. */
  vHigh: voltsField.default(5),
  /** Voltage of a low pin and of the low rail, in V. */
  vLow: voltsField.default(0),
  /** Resistance from the output to the low rail, in Ω. */
  load: partOhms.optional(),
});

/** A ladder as parsed: defaults filled in, every list of the right length. */
export type Ladder = z.infer<typeof ladderSchema>;
export type LadderInput = z.input<typeof ladderSchema>;

/**
 * Parses anything into a ladder with its defaults filled in.
 *
 * @throws {Refusal} naming each field at fault, its value and what is allowed.
 */
export function parseLadder(input: unknown): Ladder {
  const result = checkLadder(input);
  if ('problems' in result) throw new Refusal(...result.problems);
  return result.ladder;
}

/** The same without throwing. */
export function checkLadder(input: unknown): { ladder: Ladder } | { problems: [Problem, ...Problem[]] } {
  const parsed = ladderSchema.safeParse(input);
  if (!parsed.success) {
    const [first, ...others] = problemsIn(parsed.error.issues, input, 'ladder');
    return { problems: [first, ...others] };
  }
  const [first, ...others] = [...brokenLadderRules(parsed.data), ...brokenRailRules(parsed.data)];
  return first === undefined ? { ladder: parsed.data } : { problems: [first, ...others] };
}

/** Lists whose length follows from the bits. */
export function brokenLadderRules(
  { bits, rungs, series }: Pick<Ladder, 'bits' | 'rungs' | 'series'>,
  prefix = '',
): Problem[] {
  const problems: Problem[] = [];
  if (rungs !== undefined && rungs.length !== bits) {
    problems.push({
      path: `${prefix}rungs`,
      value: showValue(rungs),
      allowed: `${bits} resistances, one for each bit`,
    });
  }
  if (series !== undefined && series.length !== bits - 1) {
    problems.push({
      path: `${prefix}series`,
      value: showValue(series),
      allowed: `${bits - 1} resistances, one between each two nodes of ${bits} bits`,
    });
  }
  return problems;
}

/** A span that can be divided by. */
export function brokenRailRules({ vHigh, vLow }: Pick<Ladder, 'vHigh' | 'vLow'>, prefix = ''): Problem[] {
  if (vHigh - vLow >= outputLimits.leastSpanVolts) return [];
  return [
    {
      path: `${prefix}vHigh`,
      value: showValue(vHigh),
      allowed: `at least ${outputLimits.leastSpanVolts} V above vLow, which is ${vLow}`,
    },
  ];
}
