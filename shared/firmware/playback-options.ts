import { Refusal, showValue, type Definition } from '../contract/index.ts';
import { stepWordRule } from '../playback/index.ts';
import { wholeNumberOption, wordOption } from './options.ts';
import type { Facts } from './target.ts';

/** Options of playback that mean the same on every target. */
export const playbackOptions = {
  clockHz: wholeNumberOption(1, 1_000_000_000)
    .default(8_000_000)
    .describe('clock of the processor and its timer, in hertz'),
  accumulatorBits: wordOption(['16', '24', '32']).default('24').describe('bits of a phase accumulator'),
  toneMilliHz: wholeNumberOption(0, 4_000_000_000)
    .default(440_000)
    .describe('tone that a phase accumulator begins with, in millihertz'),
  secondToneMilliHz: wholeNumberOption(0, 4_000_000_000)
    .default(550_000)
    .describe('tone of the second of two phase accumulators, in millihertz'),
  idleCode: wholeNumberOption(0, 65_535)
    .optional()
    .describe('code that a wave played once begins from and ends at; the middle one if not given'),
  rampWords: wholeNumberOption(0, 4096)
    .default(0)
    .describe('words between the idle code and a wave played once, on either side'),
};

export interface AccumulatorSettings {
  readonly clockHz: number;
  readonly accumulatorBits: '16' | '24' | '32';
  readonly toneMilliHz: number;
  readonly secondToneMilliHz: number;
}

/**
 * What templates print of a phase accumulator (engine specification §5): the step word's rule, the place of the index.
 *
 * @throws {Refusal} where the length is no power of two, a tone lies above half the sample rate, or a product of the
 *   rule could leave 64 bits
 */
export function accumulatorFacts(
  { table }: Definition,
  { clockHz, accumulatorBits, ...tones }: AccumulatorSettings,
  cyclesPerWord: number,
): Facts & { readonly indexBits: number } {
  const bits = Number(accumulatorBits);
  const indexBits = Math.log2(table.length);
  if (!Number.isInteger(indexBits)) {
    refuse('table.length', table.length, 'a power of two for a phase accumulator');
  }
  const rule = stepWordRule({ accumulatorBits: bits, clockHz, cyclesPerSample: cyclesPerWord });
  for (const name of ['toneMilliHz', 'secondToneMilliHz'] as const) {
    if (BigInt(tones[name]) > rule.largestMilliHz) {
      refuse(`options.${name}`, tones[name], `at most ${rule.largestMilliHz}, half the sample rate`);
    }
  }
  return {
    stepWord: true,
    accumulatorBits: bits,
    accumulatorType: bits === 16 ? 'uint16_t' : 'uint32_t',
    indexBits,
    indexShift: bits - indexBits,
    clockHz,
    cyclesPerWord,
    stepNumerator: String(rule.numerator),
    stepDenominator: String(rule.denominator),
    stepHalf: String(rule.denominator / 2n),
    largestMilliHz: String(rule.largestMilliHz),
    toneMilliHz: tones.toneMilliHz,
    secondToneMilliHz: tones.secondToneMilliHz,
  };
}

function refuse(path: string, value: number, allowed: string): never {
  throw new Refusal({ path, value: showValue(value), allowed });
}
