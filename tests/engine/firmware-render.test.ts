import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { Refusal, type DefinitionInput } from '../../shared/contract/index.ts';
import { decimal, renderFiles, targets } from '../../shared/firmware/index.ts';
import { readTemplates } from '../../server/tables/read-templates.ts';

const sine = (table: DefinitionInput['table'], name = 'Fog signal'): DefinitionInput => ({
  schema: 1,
  name,
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
  table,
});

const render = (target: string, table: DefinitionInput['table'], options: unknown = {}) =>
  renderFiles(buildTable(sine(table)), target, options, readTemplates());

const refusalOf = (work: () => unknown) => {
  try {
    work();
  } catch (error) {
    if (error instanceof Refusal) return error.problems[0];
  }
  throw new Error('It was not refused.');
};

const tables: DefinitionInput['table'][] = [
  {},
  { bits: 1 },
  { length: 3 },
  { length: 100, bits: 12, coding: 'twos-complement', complement: true },
  { length: 1000, bits: 16, scale: 'mid-tread', dither: 'triangular', shaping: 2 },
  { length: 256, range: 'unipolar', cycles: 3, startPhaseDeg: 12.5 },
];

describe('files of an export', () => {
  for (const { id } of targets) {
    it(`of ${id} are the same bytes each time, in lines of LF that are not too long`, () => {
      for (const table of tables) {
        const files = render(id, table);
        expect(render(id, table)).toEqual(files);
        for (const { name, text } of files) {
          expect(name).toMatch(/^fog_signal(_main)?\.[ch]$/);
          expect(text).toMatch(/^\/\*\n \* Fog signal\n/);
          expect(text.endsWith('\n')).toBe(true);
          expect(text).not.toMatch(/\r|[ \t]$|\n\n\n|\{\{|\{%|undefined|NaN|Infinity/m);
          expect(text).toContain('enerated; do not edit');
          expect(text).toMatch(/sha256 [0-9a-f]{64}/);
          expect(Math.max(...text.split('\n').map((line) => line.length))).toBeLessThanOrEqual(110);
        }
      }
    });
  }

  it('state the figures of the report, in decibels of two decimals', () => {
    const table = buildTable(sine({}));
    const [header] = renderFiles(table, 'c99', {}, readTemplates());
    const { snrDb, sinadDb, sfdrDb, unwantedDb, enobBits } = table.report;
    expect(header.text).toContain(
      `SNR         ${snrDb?.toFixed(2)} dB (full-scale sine of 8 bits: 49.92 dB)`,
    );
    expect(header.text).toContain(`SINAD       ${sinadDb?.toFixed(2)} dB`);
    expect(header.text).toContain(`ENOB        ${enobBits?.toFixed(2)} bits`);
    expect(header.text).toContain(`SFDR        ${sfdrDb?.toFixed(2)} dB`);
    expect(header.text).toContain(`Unwanted    ${unwantedDb?.toFixed(2)} dB`);
    expect(header.text).toContain('Words       256 of uint8_t, 0 to 255, 256 bytes');
    expect(header.text).toContain('Clipped     0 samples, 0 codes');
  });

  it('say in words what does not exist', () => {
    const square = {
      ...sine({ length: 16, bits: 1 }),
      source: {
        kind: 'points',
        interpolation: 'step',
        points: [
          { x: 0, y: 1 },
          { x: 0.5, y: -1 },
        ],
      },
    } satisfies DefinitionInput;
    const [header] = renderFiles(buildTable(square), 'c99', {}, readTemplates());
    expect(header.text).toContain('SNR         no error at all');
    expect(header.text).toContain('Unwanted    none');
    const flat = { ...square, level: { normalise: 'none' }, table: { bits: 8 } } satisfies DefinitionInput;
    flat.source.points = [
      { x: 0, y: 0.3 },
      { x: 0.5, y: 0.3 },
    ];
    const [constant] = renderFiles(buildTable(flat), 'c99', {}, readTemplates());
    expect(constant.text).toContain('SNR         no error but a constant one');
    expect(constant.text).toContain('SINAD       not defined');
  });

  it('come from a saved revision’s own figures and engine version', () => {
    const table = buildTable(sine({}));
    const saved = { ...table, engineVersion: '0.9.0', report: { ...table.report, snrDb: 12.345 } };
    const [header] = renderFiles(saved, 'c99', {}, readTemplates());
    expect(header.text).toContain('Engine      0.9.0');
    expect(header.text).toContain('SNR         12.35 dB');
  });

  it('of 65,536 entries are rendered in 60 ms', () => {
    const table = buildTable(sine({ length: 65_536, bits: 16, coding: 'twos-complement' }));
    const times = Array.from({ length: 9 }, () => {
      const start = performance.now();
      renderFiles(table, 'c99', {}, readTemplates());
      return performance.now() - start;
    });
    expect(Math.min(...times)).toBeLessThanOrEqual(60);
  });
});

describe('what a target cannot take', () => {
  it.each([
    ['c98', {}, {}, 'target', '"c98"', 'one of "c99", "avr"'],
    ['c99', {}, { arrayName: 'int' }, 'options.arrayName', '"int"', 'a name that is no keyword of C or C++'],
    ['c99', {}, { arrayName: 7 }, 'options.arrayName', '7', 'a C identifier'],
    ['c99', {}, { port: 'B' }, 'options.port', '"B"', 'no such field'],
    ['avr', {}, { port: 'H' }, 'options.port', '"H"', 'a port letter, A to G'],
    ['avr', {}, { arrayName: 'PORTB' }, 'options.arrayName', '"PORTB"', 'a name with a lower-case letter'],
    ['avr', {}, { arrayName: 'prog_char' }, 'options.arrayName', '"prog_char"', 'and compilers do not use'],
    [
      'avr',
      { bits: 9 },
      { port: 'C', highPort: 'C' },
      'options.highPort',
      '"C"',
      'other than options.port, C',
    ],
    ['avr', { length: 32_768 }, {}, 'table.length', '32768', 'at most 32767 entries of 8 bits'],
    ['avr', { length: 16_384, bits: 9 }, {}, 'table.length', '16384', 'at most 16383 entries of 9 bits'],
    [
      'avr',
      { sampleAt: 'centre', fold: 'quarter' },
      {},
      'table.fold',
      '"quarter"',
      '"none" for the target avr',
    ],
  ] as const)('%s, %j, %j: %s', (target, table, options, path, value, allowed) => {
    const problem = refusalOf(() => render(target, table, options));
    expect(problem).toMatchObject({ path, value });
    expect(problem.allowed).toContain(allowed);
  });

  it.each(['null', '"x"', '[]', '{"constructor":1}', '{"__proto__":{"port":"B"}}'])('options %s', (json) => {
    const options: unknown = JSON.parse(json);
    expect(refusalOf(() => render('c99', {}, options)).path).toMatch(/^options/);
  });
});

describe('decimals', () => {
  it.each([
    [49.926, 2, '49.93'],
    [-0.001, 2, '0.00'],
    [0, 4, '0.0000'],
    [-61.9149999, 2, '-61.91'],
    [1e-12, 6, '0.000000'],
  ])('%d with %d is %s', (value, places, text) => {
    expect(decimal(value, places)).toBe(text);
  });

  it.each([49.925, 0.005, -83.745, 1.115])('%d, a tie, rounds alike whatever its last bits', (tie) => {
    const spread = [tie * (1 - 2e-15), tie * (1 - 2e-16), tie, tie * (1 + 2e-16), tie * (1 + 2e-15)];
    expect(new Set(spread.map((value) => decimal(value, 2))).size).toBe(1);
  });
});
