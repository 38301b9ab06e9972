import { z } from 'zod';
import {
  brokenLadderRules,
  brokenRailRules,
  ladderParts,
  partOhms,
  seriesOhms,
  voltsField,
} from './ladder.ts';
import { limits } from './limits.ts';
import { numberIn, oneWordOf, shortListOf, wholeNumberIn } from './number-fields.ts';
import { outputLimits } from './output-limits.ts';
import { problemsIn } from './parse-definition.ts';
import { brokenPortRules, portMapSchema } from './port-map.ts';
import { Refusal, showValue, type Problem } from './refusal.ts';
import { brokenTrialRules, distributions, tolerancePercentField } from './trials.ts';

const hertzField = numberIn(outputLimits.hertz, 'Hz');
const bitsField = wholeNumberIn(outputLimits.bits);

/** An R-2R ladder on port pins. */
const ladderOutputSchema = z.strictObject({
  kind: z.literal('ladder'),
  ...ladderParts,
  tolerancePercent: tolerancePercentField.default(1),
  /** How resistors lie within the tolerance: evenly, or normally with the tolerance at 3σ. */
  distribution: oneWordOf(distributions).default('uniform'),
  portMap: portMapSchema,
});

/** A converter of the controller itself, written through a data register. */
const onChipOutputSchema = z.strictObject({
  kind: z.literal('on-chip'),
  bits: bitsField,
  registerBits: z.literal([8, 16, 32], { error: '8, 16 or 32' }).default(16),
  alignment: oneWordOf(['right', 'left']).default('right'),
  /** Resistance of the output, in Ω. */
  outputOhms: seriesOhms.default(0),
});

const wordMax = 2 ** 32 - 1;

/** A converter behind a serial line. The word is `command | ((code << shift) & mask)`. */
const serialOutputSchema = z.strictObject({
  kind: z.literal('serial'),
  bits: bitsField,
  wordBits: z.literal([8, 16, 24, 32], { error: '8, 16, 24 or 32' }).default(16),
  shift: wholeNumberIn({ min: 0, max: 31 }).default(0),
  /** Bits of the word that belong to the code; all of the code's where absent. */
  mask: wholeNumberIn({ min: 1, max: wordMax }).optional(),
  /** Bits of the word that are the same in each. */
  command: wholeNumberIn({ min: 0, max: wordMax }).default(0),
  byteOrder: oneWordOf(['big-endian', 'little-endian']).default('big-endian'),
  outputOhms: seriesOhms.default(0),
});

export const pwmModes = ['fast', 'phase-correct'] as const;

/** Pulse-width modulation; the filter makes a level of it. */
const pwmOutputSchema = z.strictObject({
  kind: z.literal('pwm'),
  bits: bitsField,
  mode: oneWordOf(pwmModes).default('fast'),
  prescaler: wholeNumberIn(outputLimits.prescaler).default(1),
  outputOhms: seriesOhms.default(0),
});

/** What smooths the output; takes no current from what is before it. */
const filterSchema = z.discriminatedUnion(
  'kind',
  [
    z.strictObject({ kind: z.literal('none') }),
    /** First-order low-pass, −3.01 dB at the cut-off. */
    z.strictObject({ kind: z.literal('rc'), cutoffHz: hertzField }),
    /** Second-order Butterworth low-pass, −3.01 dB at the cut-off. */
    z.strictObject({ kind: z.literal('butterworth'), cutoffHz: hertzField }),
  ],
  { error: 'a filter of kind "none", "rc" or "butterworth"' },
);

const opAmpSchema = z.strictObject({
  slewRateVPerS: numberIn(outputLimits.slewRateVPerS, 'V/s'),
  gainBandwidthHz: hertzField,
});

const stageSchema = z.strictObject({
  /** Resistance from the output to the low rail, in Ω; behind the op-amp where there is one. */
  load: partOhms.optional(),
  /** Capacitance of the converter's output node to the low rail, in F. */
  outputCapacitanceF: numberIn(outputLimits.farads, 'F').default(0),
  /** Voltage follower. */
  opAmp: opAmpSchema.optional(),
  filter: filterSchema.default({ kind: 'none' }),
  /** How much later rising edges come than falling ones, in s; below 0 they come earlier. */
  edgeSkewS: numberIn(outputLimits.edgeSkewS, 's').default(0),
});

const boardNameError = `${limits.nameLength.min} to ${limits.nameLength.max} characters`;

/** What a table plays on: clock, pins, converter and what follows it (engine specification §6). */
export const boardSchema = z.strictObject({
  schema: z.literal(1, { error: '1' }),
  name: z
    .string({ error: boardNameError })
    .min(limits.nameLength.min, { error: boardNameError })
    .max(limits.nameLength.max, { error: boardNameError })
    .regex(/^\P{Cs}*$/u, { error: 'whole characters, no half of a surrogate pair' }),
  clock: z.strictObject({
    hz: hertzField,
    /** ± of the clock, in parts per million. */
    tolerancePpm: numberIn(outputLimits.clockTolerancePpm, 'ppm').default(0),
  }),
  timer: z
    .strictObject({
      prescalers: shortListOf(
        wholeNumberIn(outputLimits.prescaler),
        outputLimits.prescalers,
        'prescalers',
      ).default([1]),
      /** Width of the compare register. */
      compareBits: wholeNumberIn(outputLimits.compareBits).default(16),
    })
    .prefault({}),
  /** Bytes of program memory that tables may take. */
  flashBytes: wholeNumberIn(outputLimits.flashBytes).optional(),
  /** Rails of the output, in V. */
  supply: z.strictObject({ vHigh: voltsField.default(5), vLow: voltsField.default(0) }).prefault({}),
  /** What the data sheet allows, in A: of one pin, and of all output pins together. */
  currents: z
    .strictObject({
      pinAmps: numberIn(outputLimits.amps, 'A').optional(),
      totalAmps: numberIn(outputLimits.amps, 'A').optional(),
    })
    .prefault({}),
  output: z.discriminatedUnion(
    'kind',
    [ladderOutputSchema, onChipOutputSchema, serialOutputSchema, pwmOutputSchema],
    { error: 'an output of kind "ladder", "on-chip", "serial" or "pwm"' },
  ),
  stage: stageSchema.prefault({}),
  /** Measured voltages by code; 2^bits of them. */
  levels: shortListOf(voltsField, { min: 2, max: 2 ** limits.bits.max }, 'voltages').optional(),
});

/** A board as parsed: every default filled in, every rule kept. */
export type Board = z.infer<typeof boardSchema>;
export type BoardInput = z.input<typeof boardSchema>;
export type BoardOutput = Board['output'];
export type OutputKind = BoardOutput['kind'];
export type LadderOutput = z.infer<typeof ladderOutputSchema>;
export type OnChipOutput = z.infer<typeof onChipOutputSchema>;
export type SerialOutput = z.infer<typeof serialOutputSchema>;
export type PwmOutput = z.infer<typeof pwmOutputSchema>;
export type OutputFilter = z.infer<typeof filterSchema>;
export type OpAmp = z.infer<typeof opAmpSchema>;
export type OutputStage = z.infer<typeof stageSchema>;

/**
 * Parses anything into a board with its defaults filled in.
 *
 * @throws {Refusal} naming each field at fault, its value and what is allowed.
 */
export function parseBoard(input: unknown): Board {
  const result = checkBoard(input);
  if ('problems' in result) throw new Refusal(...result.problems);
  return result.board;
}

/** The same without throwing: a form shows the problems beside their fields. */
export function checkBoard(input: unknown): { board: Board } | { problems: [Problem, ...Problem[]] } {
  const parsed = boardSchema.safeParse(input);
  if (!parsed.success) {
    const [first, ...others] = problemsIn(parsed.error.issues, input, 'board');
    return { problems: [first, ...others] };
  }
  const [first, ...others] = brokenBoardRules(parsed.data);
  return first === undefined ? { board: parsed.data } : { problems: [first, ...others] };
}

/** Rules that look at two fields at once. */
function brokenBoardRules({ supply, output, levels }: Board): Problem[] {
  const problems = brokenRailRules(supply, 'supply.');
  if (output.kind === 'ladder') problems.push(...brokenLadderOutputRules(output));
  if (output.kind === 'on-chip' && output.bits > output.registerBits) {
    problems.push({
      path: 'output.bits',
      value: showValue(output.bits),
      allowed: `at most output.registerBits, which is ${output.registerBits}`,
    });
  }
  if (output.kind === 'serial') problems.push(...brokenSerialRules(output));
  if (levels !== undefined && levels.length !== 2 ** output.bits) {
    problems.push({
      path: 'levels',
      value: showValue(levels),
      allowed: `${2 ** output.bits} voltages, one for each code of ${output.bits} bits`,
    });
  }
  return problems;
}

function brokenLadderOutputRules(output: LadderOutput): Problem[] {
  return [
    ...brokenLadderRules(output, 'output.'),
    ...brokenPortRules(output.portMap, output.bits, 'output.portMap.'),
    ...brokenTrialRules(output, 'output.'),
  ];
}

function brokenSerialRules({ bits, wordBits, shift, mask, command }: SerialOutput): Problem[] {
  const problems: Problem[] = [];
  const refuse = (field: string, value: unknown, allowed: string) =>
    problems.push({ path: `output.${field}`, value: showValue(value), allowed });
  const word = 2 ** wordBits;
  if (bits + shift > wordBits) {
    refuse('shift', shift, `at most ${Math.max(0, wordBits - bits)}: ${bits} bits in a word of ${wordBits}`);
    return problems;
  }
  const codeBits = (2 ** bits - 1) * 2 ** shift;
  const kept = mask ?? codeBits;
  if (kept >= word) refuse('mask', kept, `below ${word}, as the word has ${wordBits} bits`);
  else if ((kept & codeBits) >>> 0 !== codeBits) {
    refuse('mask', kept, `a mask that holds every bit of the code, ${codeBits}`);
  }
  if (command >= word) refuse('command', command, `below ${word}, as the word has ${wordBits} bits`);
  else if ((command & kept) !== 0) refuse('command', command, 'bits that the mask leaves free');
  return problems;
}
