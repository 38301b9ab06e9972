import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import { readCsv, type CsvReading } from '../../shared/imports/index.ts';
import { holds } from './support/seeded.ts';

const valuesOf = (text: string, reading?: CsvReading) => {
  const outcome = readCsv(text, reading);
  if (outcome.kind === 'ask') throw new Error(JSON.stringify(outcome.question));
  return outcome.values;
};

function refusalOf(text: string, reading?: CsvReading): string {
  try {
    readCsv(text, reading);
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
  throw new Error('nothing was refused');
}

describe('a column of numbers', () => {
  it.each([
    ['1\n2\n-3.5\n', [1, 2, -3.5]],
    ['volts\n0.1\n.2\n1e-3\n', [0.1, 0.2, 0.001]],
    ['t;volts\r\nstart;0.5\r\nend;\u22120.5\r\n', [0.5, -0.5]],
    ['"name, quoted"\t"volts"\na\t"1"\nb\t"2"', [1, 2]],
    ['# 1\n 2\n', undefined],
    ['  1.0   a\n  2.0   b\n', [1, 2]],
    ['0,5\n0,75\n1\n', undefined],
    ['x;0,5\ny;0,75\n', [0.5, 0.75]],
    ["v;w\na;1'000.5\nb;2", [1000.5, 2]],
  ])('%j', (text, values) => {
    if (values) expect(valuesOf(text)).toEqual(values);
    else expect(() => valuesOf(text)).toThrow();
  });

  it('comes back as it was written, with every separator, decimal sign and heading', () => {
    const numbers = fc.array(fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e6, max: 1e6 }), {
      minLength: 2,
      maxLength: 50,
    });
    holds(
      fc.property(
        numbers,
        fc.constantFrom(',', ';', '\t', '|'),
        fc.boolean(),
        fc.boolean(),
        (values, delimiter, hasHeader, isComma) => {
          const decimal = isComma && delimiter !== ',' ? 'comma' : 'point';
          const shown = values.map((value) =>
            decimal === 'comma' ? String(value).replace('.', ',') : String(value),
          );
          const rows = shown.map((cell, k) => `row ${k}${delimiter}${cell}`);
          const text = [...(hasHeader ? [`name${delimiter}volts`] : []), ...rows].join('\n');
          const outcome = readCsv(text, { delimiter, column: 1, hasHeader, decimal });
          expect(outcome).toMatchObject({ kind: 'read', hasHeader, column: 1 });
          expect(outcome.kind === 'read' && outcome.values.map((value) => value || 0)).toEqual(
            values.map((value) => value || 0),
          );
        },
      ),
    );
  });
});

describe('what only the writer knows is asked', () => {
  it('whether a lone comma is the decimal sign', () => {
    const outcome = readCsv('a;1,500\nb;2,250\n');
    if (outcome.kind !== 'ask' || outcome.question.about !== 'decimal') throw new Error('nothing was asked');
    const { cell, answers } = outcome.question;
    expect(cell).toBe('1,500');
    expect(answers.map(({ shown }) => shown)).toEqual(['1,500 is 1.5', '1,500 is 1500']);
    expect(answers.map(({ reading }) => valuesOf('a;1,500\nb;2,250\n', reading))).toEqual([
      [1.5, 2.25],
      [1500, 2250],
    ]);
  });

  it('whether two whole numbers on each line are one with a decimal comma', () => {
    const outcome = readCsv('0,5\n-1,25\n');
    if (outcome.kind !== 'ask') throw new Error('nothing was asked');
    expect(outcome.question.answers.map(({ shown }) => shown)).toEqual([
      '0.5: one column, decimal comma',
      '0 and 5: two columns',
    ]);
    expect(valuesOf('0,5\n-1,25\n', outcome.question.answers[0].reading)).toEqual([0.5, -1.25]);
  });

  it('which column, where several hold numbers; its answer is a reading', () => {
    const text = 't,volts\n0,0.5\n1,0.75\n';
    const outcome = readCsv(text);
    if (outcome.kind !== 'ask') throw new Error('nothing was asked');
    expect(outcome.columns.map(({ name, isNumeric }) => [name, isNumeric])).toEqual([
      ['t', true],
      ['volts', true],
    ]);
    expect(outcome.question.answers.map(({ reading }) => valuesOf(text, reading))).toEqual([
      [0, 1],
      [0.5, 0.75],
    ]);
  });
});

describe('a column that cannot be read', () => {
  it.each([
    ['1\n2\nthree\n4', {}, 'line 3, column 1: "three" is not allowed; allowed: a number'],
    [
      'name,volts\n"two\nlines",1\nx,  oops\ny,2',
      { column: 1 },
      'line 4, column 5: "oops" is not allowed; allowed: a number',
    ],
    ['a;1\nb;\nc;2', { column: 1 }, 'line 2, column 3: an empty cell'],
    ['1;2\n3;4', { column: 2 }, 'column: 3 is not allowed; allowed: 1 to 2'],
    ['1\n', {}, 'file: 1 numbers is not allowed; allowed: at least 2'],
    ['a;0,5\nb;x', { column: 1 }, 'line 2, column 3: "x"'],
    ['v\n0.5\n0,7', { hasHeader: true, delimiter: ';' }, 'line 3, column 1: "0,7"'],
    ['v\n1e999\n2', { hasHeader: true }, 'line 2, column 1: "1e999"'],
    ['v;w\na;"1\nb;2', {}, 'a quote that is never closed'],
    ['', {}, 'file: an empty text'],
  ] as const)('%j is refused by place', (text, reading, message) => {
    expect(refusalOf(text, reading)).toContain(message);
  });
});
