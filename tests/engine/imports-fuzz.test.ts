import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import {
  betterTable,
  decodeText,
  findPeriod,
  oldTableOf,
  readCode,
  readCsv,
  readWav,
  reportOldTable,
} from '../../shared/imports/index.ts';
import { holds } from './support/seeded.ts';
import { wavOf } from './support/recordings.ts';

/** Whatever comes in: an answer or a refusal, never another error. A hang ends the test by its time limit. */
function answers(work: () => unknown): void {
  try {
    work();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    for (const { path, value, allowed } of error.problems) {
      expect(path.length > 0 && value.length > 0 && allowed.length > 0).toBe(true);
      expect(`${path}${value}${allowed}`.length).toBeLessThan(500);
    }
  }
}

/** Up to 24 pieces of a language, and odd characters between them. */
const pieces = (list: readonly string[]) => {
  const all = [...list, '\u0000', '\u2028', '\ud800', 'é', '`', '\u00a0', '?', '@x', '\\', '~'];
  return fc
    .array(fc.nat(all.length - 1), { maxLength: 24 })
    .map((places) => places.map((place) => all[place]).join(''));
};

const cPieces = pieces([
  'const uint8_t a[] = {',
  'int16_t b[4]={',
  '}',
  '};',
  ';',
  '{',
  '[',
  ']',
  '(',
  ')',
  ',',
  ' ',
  '\n',
  '\\\n',
  '1',
  '0x7F',
  '0b1',
  "1'0",
  '-',
  '+',
  "'a'",
  '"s"',
  "'",
  '"',
  '/*',
  '*/',
  '//',
  '#define A 1',
  '#define A(',
  '#if 0',
  '#if X',
  '#else',
  '#endif',
  '#include <x>',
  'A',
  'std::array<u8,',
  '2>',
  'R"(',
  ')"',
  '[[',
  '=',
  '.',
  '\r',
]);
const assemblyPieces = pieces([
  'a:',
  ' .byte ',
  ' .word ',
  ' .2byte',
  ' db ',
  '1',
  ',',
  "'a",
  "'",
  '"',
  '$ff',
  '0Ah',
  '-',
  ';',
  '#',
  '@',
  '//',
  '/*',
  '*/',
  '\n',
  '\r\n',
  '.equ A, 1',
  'A = 2',
  'A',
  ' .rept 3',
  ' ret',
  '  ',
  '=',
]);
const hexPieces = pieces([
  ':',
  '00000001FF',
  ':00000001FF',
  ':0300300002337A1E',
  '\n',
  '\r\n',
  ':020000040001F9',
  ':020000021000EC',
  '0',
  'F',
  ' ',
  ':0100000001FE',
]);
const csvPieces = pieces([
  '1',
  '0,5',
  '1,500',
  '-2.5e3',
  'volts',
  ';',
  ',',
  '\t',
  '|',
  '"',
  '""',
  '\n',
  '\r\n',
  '\r',
  ' ',
  "1'000",
  '\u2212',
  '.',
]);

describe('parsers, fed anything', () => {
  // 10⁵ inputs in all.
  it('of source code', () => {
    holds(
      fc.property(cPieces, (text) => answers(() => readCode(text))),
      30_000,
    );
    holds(
      fc.property(assemblyPieces, (text) => answers(() => readCode(text))),
      20_000,
    );
    holds(
      fc.property(hexPieces, (text) => answers(() => readCode(text))),
      15_000,
    );
  });

  it('of columns', () => {
    const reading = fc.record(
      {
        delimiter: fc.constantFrom(',', ';', '\t', '|', ' ' as const),
        decimal: fc.constantFrom('point', 'comma' as const),
        hasHeader: fc.boolean(),
        column: fc.integer({ min: -1, max: 3 }),
      },
      { requiredKeys: [] },
    );
    holds(
      fc.property(csvPieces, reading, (text, how) => answers(() => readCsv(text, how))),
      20_000,
    );
  });

  it('of recordings, whose bytes are changed here and there', () => {
    const sound = wavOf([0, 0.5, -0.5, 0.25, 0, 1, -1, 0], {
      bits: 16,
      isFloat: false,
      channels: 2,
      sampleRateHz: 8000,
    });
    const changes = fc.array(fc.tuple(fc.nat(sound.length - 1), fc.nat(255)), { maxLength: 6 });
    holds(
      fc.property(changes, fc.nat(sound.length), fc.nat(2), (changed, length, channel) => {
        const file = sound.slice(0, length);
        for (const [at, byte] of changed) if (at < length) file[at] = byte;
        answers(() => findPeriod(readWav(file, channel).samples, 8000));
      }),
      10_000,
    );
    holds(
      fc.property(fc.uint8Array({ maxLength: 60 }), (bytes) => answers(() => readCode(decodeText(bytes)))),
      4_000,
    );
  });

  it('of tables', () => {
    const values = fc.array(
      fc.oneof(fc.integer({ min: 0, max: 255 }), fc.integer({ min: -(2 ** 31), max: 2 ** 32 - 1 })),
      { maxLength: 40 },
    );
    holds(
      fc.property(values, fc.boolean(), (list, isSigned) => {
        const array = { name: '', line: 1, typeName: '', wordBits: 32, isSigned, values: list, notes: [] };
        answers(() => {
          const table = oldTableOf(array);
          reportOldTable(table);
          betterTable('', table);
        });
      }),
      1_000,
    );
  });

  it.each([
    ['one line of a million digits', '1'.repeat(1_000_000)],
    ['blanks alone', ' '.repeat(1_000_000)],
    ['a million blanks before a directive', `${' '.repeat(1_000_000)}.byte`],
    ['brackets', '('.repeat(1_000_000)],
    ['braces', 'u8 a[] = {'.repeat(100_000)],
    ['one list on one line', `u8 a[] = {${'1,'.repeat(500_000)}};`],
    ['data on one line', ` .byte ${'1,'.repeat(500_000)}`],
    [
      'a macro of a macro of a macro',
      `${Array.from({ length: 30 }, (_, i) => `#define M${i + 1} M${i}\n`).join('')}#define M0 1\nu8 a[] = {${'M30,'.repeat(200_000)}};`,
    ],
    ['quotes', `"${'\\"'.repeat(500_000)}`],
    ['a word without an end', 'a'.repeat(1_000_000)],
    ['records without an end', ':0100000001FE\n'.repeat(70_000)],
    ['open comments', '/*'.repeat(500_000)],
    ['backslashes', '\\\n'.repeat(400_000)],
    ['conditions', '#if X\n'.repeat(150_000)],
    ['columns', '1,'.repeat(500_000)],
    ['semicolons', ';'.repeat(1_000_000)],
    ['lines', '\n'.repeat(1_000_000)],
  ])('a megabyte of one thing is answered: %s', (_, text) => {
    answers(() => readCode(text));
    answers(() => readCsv(text));
  });
});
