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

/** Targets whose files say what they are, in comments. */
const saying = targets.filter(({ commentOf }) => commentOf !== undefined);

describe('files of an export', () => {
  for (const { id } of targets) {
    it(`of ${id} are the same bytes each time, under plain names`, () => {
      for (const table of tables) {
        const files = render(id, table);
        expect(render(id, table)).toEqual(files);
        expect(files.length).toBeGreaterThan(0);
        for (const { name, text, encoding } of files) {
          expect(name).toMatch(/^fog_signal(_main)?\.[a-z]{1,4}$/);
          expect(encoding).toBe(id === 'binary' || id === 'wav' ? 'base64' : 'utf-8');
          if (encoding === 'base64') expect(Buffer.from(text, 'base64').toString('base64')).toBe(text);
        }
      }
    });
  }

  for (const { id } of saying) {
    it(`of ${id} have lines of LF that are not too long, say what they are and where from`, () => {
      for (const table of tables) {
        for (const { text } of render(id, table)) {
          expect(text).toMatch(/^(?:\/\*\n \* |\/\/ |# )Fog signal\n/);
          expect(text.endsWith('\n')).toBe(true);
          expect(text).not.toMatch(/\r|[ \t]$|\n\n\n|\{\{ |\{%|undefined|NaN|Infinity/m);
          expect(text).toContain('enerated; do not edit');
          expect(text).toMatch(/sha256 [0-9a-f]{64}/);
          expect(Math.max(...text.split('\n').map((line) => line.length))).toBeLessThanOrEqual(120);
        }
      }
    });

    it(`of ${id} end their lines and begin with the licence as asked, and change nothing else`, () => {
      const plain = render(id, {});
      const own = render(id, {}, { lineEnding: 'crlf', licenceLine: 'SPDX-License-Identifier: MIT' });
      own.forEach(({ text }, k) => {
        const [licence, ...lines] = text.split('\r\n');
        expect(licence).toContain('SPDX-License-Identifier: MIT');
        expect(lines.join('\n')).toBe(plain[k].text);
        expect(text.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
      });
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
    expect(header.text).toContain('Words       0 to 255; 256 of uint8_t, 256 bytes');
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
    ['c99', {}, { arrayName: 'loop' }, 'options.arrayName', '"loop"', 'a name that is no keyword of Rust'],
    [
      'rust',
      {},
      { arrayName: 'lambda' },
      'options.arrayName',
      '"lambda"',
      'a name that is no keyword of Python',
    ],
    ['asm', {}, { arrayName: 'r12' }, 'options.arrayName', '"r12"', 'a name that is no register'],
    ['c99', {}, { columns: '65' }, 'options.columns', '"65"', 'a whole number from 1 to 64'],
    [
      'c99',
      {},
      { packed: 'yes' },
      'options.packed',
      '"yes" with 8 bits',
      '"yes" with 1 to 4 bits, or with 9 to 12',
    ],
    ['wav', {}, { packed: 'yes' }, 'options.packed', '"yes"', 'no such field'],
    ['c99', {}, { portMap: 'B.0 B.1' }, 'options.portMap', '"B.0 B.1"', 'one place for each of the 8 bits'],
    ['c99', { bits: 2 }, { portMap: 'B.0 B.0' }, 'options.portMap', '"B.0"', 'each pin once'],
    ['c99', { bits: 2 }, { portMap: 'B.0 B1' }, 'options.portMap', '"B1"', 'places as B.0'],
    ['avr', { bits: 2 }, { portMap: 'B.0 B.8' }, 'options.portMap', '"B.8"', 'a pin from 0 to 7'],
    ['avr', { bits: 3 }, { portMap: 'B.0 C.0 D.0' }, 'options.portMap', '"B.0 C.0 D.0"', 'one port or two'],
    [
      'c99',
      {},
      { reservedPins: 'B.0=low' },
      'options.reservedPins',
      '"B.0=low"',
      'nothing without options.portMap',
    ],
    [
      'c99',
      { bits: 1 },
      { portMap: 'B.0', reservedPins: 'B.0=low' },
      'options.reservedPins',
      '"B.0"',
      'each pin once',
    ],
    [
      'c99',
      { bits: 1 },
      { portMap: 'B.0', reservedPins: 'C.0=low' },
      'options.reservedPins',
      '"C.0=low"',
      'the ports of',
    ],
    ['avr', { length: 100 }, { playback: 'accumulator' }, 'table.length', '100', 'a power of two'],
    [
      'avr',
      {},
      { playback: 'timer', compare: '20' },
      'options.compare',
      '20',
      'the handler takes 50 cycles of 21',
    ],
    [
      'avr',
      {},
      { playback: 'accumulator', toneMilliHz: '4000000000' },
      'options.toneMilliHz',
      '4000000000',
      'half the sample rate',
    ],
    ['avr', { length: 1024 }, { unroll: 'whole' }, 'options.unroll', '"whole"', 'above 1016 entries'],
    ['cortex-m', {}, { playback: 'timer' }, 'options.portAddress', '""', 'one address'],
    [
      'c99',
      {},
      { playback: 'once', idleCode: '256' },
      'options.idleCode',
      '256',
      'a code of 8 bits, 0 to 255',
    ],
    ['intel-hex', {}, { address: '0xFFFFFFFF' }, 'options.address', '4294967295', 'at most 4294967040'],
    ['wav', {}, { repeats: '65536' }, 'options.repeats', '65536', 'at most 4096 for 256 entries'],
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

  it('a register’s name that is made from the definition’s, as one that is given', () => {
    const table = buildTable(sine({}, 'R12'));
    expect(refusalOf(() => renderFiles(table, 'asm', {}, readTemplates()))).toMatchObject({
      path: 'options.arrayName',
      value: '"r12"',
    });
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
