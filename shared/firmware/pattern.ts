import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import { z } from 'zod';
import { patternMs, type PulsePattern } from '../contract/index.ts';
import { canonicalJson } from './digest.ts';
import { parsePatternText, patternText, patternTextFault } from './pattern-text.ts';
import type { Target, TargetFile } from './target.ts';

/** Option of targets that carry a pattern of pulses and pauses. */
export const pulsesOption = z
  .string({ error: 'steps as 200/100x3 500/0' })
  .superRefine((text, context) => {
    const allowed = patternTextFault(text);
    if (allowed !== undefined) context.addIssue({ code: 'custom', message: allowed });
  })
  .default('none')
  .describe(
    'pulses and pauses to export beside the table: on/off in ms, x repeats, a step a word, endless behind them, as "200/100x3 500/0 endless"; none for no pattern',
  );

/**
 * Most clock cycles of one call of `NAME_pulses_tick` on AVR, `rcall` and `ret` included: found by the simulator
 * avr8js on programs by avr-gcc -Os, held by the proofs of that target.
 */
export const avrTickCycles = 119;

/** Digest of a pattern: SHA-256 over its RFC 8785 canonical JSON in UTF-8, 64 lower-case hexadecimal digits. */
export const patternDigest = (pattern: PulsePattern) =>
  bytesToHex(sha256(utf8ToBytes(canonicalJson(pattern))));

/**
 * The option that stands for a table's pattern, of a target that carries one; nothing where there is none, or where
 * the target has no such option.
 */
export function pulsesOptionFor(
  { options }: Pick<Target, 'options'>,
  pattern: PulsePattern | undefined,
): Readonly<Record<string, string>> {
  return pattern === undefined || !('pulses' in options.shape) ? {} : { pulses: patternText(pattern) };
}

type Step = PulsePattern['steps'][number];

interface Kind {
  /** Templates with the endings of their files. */
  readonly files: readonly (readonly [template: string, ending: string])[];
  readonly row: (step: Step) => string;
  /** Between two rows. */
  readonly comma: string;
}

const braces =
  (unsigned: string): Kind['row'] =>
  ({ onMs, offMs, repeats }) =>
    `    {${onMs}${unsigned}, ${offMs}${unsigned}, ${repeats}${unsigned}}`;

const hexByte = (byte: number) => `\\x${byte.toString(16).padStart(2, '0')}`;

const inC: Kind = {
  files: [
    ['common/pulses.h', '_pulses.h'],
    ['common/pulses.c', '_pulses.c'],
  ],
  row: braces('u'),
  comma: ',',
};

const kinds = {
  c: inC,
  avr: inC,
  cpp: { files: [['cpp17/pulses.hpp', '_pulses.hpp']], row: braces('U'), comma: ',' },
  rust: {
    files: [['rust/pulses.rs', '_pulses.rs']],
    row: ({ onMs, offMs, repeats }) => `    Pulse { on_ms: ${onMs}, off_ms: ${offMs}, repeats: ${repeats} }`,
    comma: ',',
  },
  python: {
    files: [['python/pulses.py', '_pulses.py']],
    row: ({ onMs, offMs, repeats }) =>
      `    b"${[onMs & 255, onMs >> 8, offMs & 255, offMs >> 8, repeats].map(hexByte).join('')}"`,
    comma: '',
  },
} as const satisfies Record<string, Kind>;

/**
 * Files of a pattern: its array and a reader that is called once a millisecond. None where no pattern is asked for.
 *
 * @param text as `patternText` writes it
 */
export function patternFiles(language: keyof typeof kinds, text: string): TargetFile[] {
  const pattern = parsePatternText(text);
  if (pattern === undefined) return [];
  const { files, row, comma }: Kind = kinds[language];
  const isAvr = language === 'avr';
  const facts = {
    pulseRows: pattern.steps.map(row).join(`${comma}\n`),
    pulseCount: pattern.steps.length,
    pulseTotalMs: patternMs(pattern),
    pulseEndless: pattern.endless,
    pulseDigest: patternDigest(pattern),
    inProgramMemory: isAvr,
    tickCycles: isAvr && avrTickCycles,
  };
  return files.map(([template, ending]) => ({ template, ending, facts }));
}

/** A pattern as a document has it, with its digest; `false` where none is asked for. */
export function patternJson(text: string): string | false {
  const pattern = parsePatternText(text);
  if (pattern === undefined) return false;
  const { endless, steps } = pattern;
  return canonicalJson({
    steps,
    endless,
    totalMs: patternMs(pattern),
    digest: `sha256 ${patternDigest(pattern)}`,
  });
}
