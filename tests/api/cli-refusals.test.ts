import { existsSync } from 'node:fs';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { limits } from '../../shared/contract/index.ts';
import { expectOneLine, fogJson, stepwell } from '../support/command-line.ts';

let folder: string;
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'stepwell-cli-'));
});
afterAll(() => rm(folder, { recursive: true }));

const partial = { harmonic: 1, amplitude: 1, phaseDeg: 0 };
const harmonics = (partials: object[]) => ({ source: { kind: 'harmonics', partials } });
const leaf = { gain: 1, source: { kind: 'harmonics', partials: [partial] } };
const mix = (parts: object[]) => ({ kind: 'mix', operation: 'sum', parts });

describe('wrong input ends with status 2, one line on standard error and nothing on standard output', () => {
  it.each<[what: string, input: string, line: RegExp]>([
    [
      'NaN',
      '{"schema": 1, "level": NaN}',
      /^standard input, line 1, column 24: "NaN" is not allowed; allowed: a JSON value$/,
    ],
    [
      'a truncated document',
      fogJson().slice(0, 60),
      /^standard input, line 1, column \d+: .* is not allowed; allowed: /,
    ],
    [
      'nothing',
      '',
      /^standard input, line 1, column 1: the end of the text is not allowed; allowed: a JSON value$/,
    ],
    [
      'infinity',
      fogJson(harmonics([{ ...partial, amplitude: 0 }])).replace('"amplitude":0', '"amplitude":1e999'),
      /^source\.partials\[0\]\.amplitude: Infinity is not allowed; allowed: a finite number$/,
    ],
    [
      'a negative harmonic',
      fogJson(harmonics([{ ...partial, harmonic: -1 }])),
      /^source\.partials\[0\]\.harmonic: -1 is not allowed; allowed: a whole number from 1 to 32768$/,
    ],
    [
      'a huge amplitude',
      fogJson(
        harmonics([
          { ...partial, amplitude: 1e308 },
          { ...partial, amplitude: 1e308 },
        ]),
      ),
      /^source/,
    ],
    [
      '5,000 partials',
      fogJson(harmonics(Array.from({ length: 5000 }, () => partial))),
      /^source\.partials: a list of 5000 is not allowed; allowed: a list of 1 to 4096 partials$/,
    ],
    [
      '65 leaf sources',
      fogJson({
        source: mix(
          Array.from({ length: 5 }, () => ({ gain: 1, source: mix(Array.from({ length: 13 }, () => leaf)) })),
        ),
      }),
      /^source: 65 leaf sources is not allowed; allowed: at most 64 leaf sources/,
    ],
    [
      'points out of order',
      fogJson({
        source: {
          kind: 'points',
          interpolation: 'linear',
          points: [
            { x: 0.5, y: 0 },
            { x: 0.2, y: 1 },
          ],
        },
      }),
      /^source\.points\[1\]\.x: 0\.2 is not allowed; allowed: more than the x before it, 0\.5$/,
    ],
    [
      'length 1',
      fogJson({ table: { length: 1 } }),
      /^table\.length: 1 is not allowed; allowed: a whole number from 2 to 65536/,
    ],
    [
      'length 65537',
      fogJson({ table: { length: 65_537 } }),
      /^table\.length: 65537 is not allowed; allowed: a whole number from 2 to 65536/,
    ],
    [
      'bits 0',
      fogJson({ table: { bits: 0 } }),
      /^table\.bits: 0 is not allowed; allowed: a whole number from 1 to 16/,
    ],
    [
      'bits 17',
      fogJson({ table: { bits: 17 } }),
      /^table\.bits: 17 is not allowed; allowed: a whole number from 1 to 16/,
    ],
    [
      'partials that cancel',
      fogJson(harmonics([partial, { ...partial, amplitude: -1 }])),
      /^source: a zero signal is not allowed; /,
    ],
    [
      'an unknown field',
      fogJson({ colour: 'red' }),
      /^colour: "red" is not allowed; allowed: no such field$/,
    ],
    [
      'a field named like a command',
      fogJson({ 'a\u001b[2J\nb': 1 }),
      /^\["a\\u001b\[2J\\nb"\]: 1 is not allowed; allowed: no such field$/,
    ],
    ['a list', '[]', /^definition: /],
    [
      'nesting without end',
      '['.repeat(100_000),
      /^standard input, line 1, column 100001: the end of the text is not allowed/,
    ],
    [
      'nesting 100,000 deep',
      `${'{"source":'.repeat(100_000)}1${'}'.repeat(100_000)}`,
      /is not allowed; allowed: /,
    ],
    [
      '10 MB',
      `"${'x'.repeat(10_000_000)}"`,
      new RegExp(
        `^standard input: a larger document is not allowed; allowed: at most ${limits.requestBytes} bytes$`,
      ),
    ],
  ])('%s', async (_what, input, line) => {
    expectOneLine(await stepwell(['report', '-', '--json'], { input }), line);
    expectOneLine(await stepwell(['render', '-', '--target', 'c99'], { input }), line);
  });

  it('UTF-8 that is none', async () => {
    const broken = join(folder, 'latin1.json');
    await writeFile(broken, Buffer.from(fogJson({ name: 'Tön' }), 'latin1'));
    expectOneLine(
      await stepwell(['report', broken]),
      /latin1\.json: a document in another encoding is not allowed; allowed: UTF-8$/,
    );
  });

  it.each([
    [
      'fog.json',
      'missing.json',
      /^missing\.json: a path that does not exist is not allowed; allowed: a file that can be read/,
    ],
    ['fog.json', '.', /^\.: a folder is not allowed; allowed: a file that can be read/],
  ])('no such file as %s: %s', async (_real, name, line) => {
    expectOneLine(await stepwell(['report', name], { folder }), line);
  });

  it.each<[args: string[], line: RegExp]>([
    [[], /^usage: no command; allowed: stepwell with one of render, report/],
    [['frob'], /^usage: unknown command 'frob'; allowed: stepwell with one of render, report/],
    [['report'], /^usage: missing required argument 'DEFINITION\.json'; allowed: stepwell report /],
    [['report', 'a', 'b'], /^usage: too many arguments/],
    [['report', '-', '--jsn'], /^usage: unknown option '--jsn'/],
    [['render', '-'], /^usage: required option '--target <name>' not specified; allowed: stepwell render /],
    [['render', '-', '--target'], /^usage: option '--target <name>' argument missing/],
    [['render', '-', '--target', 'c98'], /^--target: "c98" is not allowed; allowed: one of "c99", "avr"/],
    [
      ['render', '-', '--target', 'c99', '--name', 'int'],
      /^--name: "int" is not allowed; allowed: a name that is no keyword of C or C\+\+$/,
    ],
    [
      ['render', '-', '--target', 'c99', '--name', '../x'],
      /^--name: "\.\.\/x" is not allowed; allowed: an ASCII letter, then /,
    ],
    [
      ['render', '-', '--target', 'c99', '--port', 'B'],
      /^--port: "B" is not allowed; allowed: no such field$/,
    ],
    [
      ['render', '-', '--target', 'avr', '--high-port', 'B'],
      /^--high-port: "B" is not allowed; allowed: a port letter other than --port, B$/,
    ],
  ])('%j', async (args, line) => {
    expectOneLine(await stepwell(args, { input: fogJson() }), line);
  });

  it('and writes no file', async () => {
    const out = join(folder, 'never');
    await stepwell(['render', '-', '--target', 'c99', '--out', out], {
      input: fogJson({ table: { bits: 0 } }),
    });
    expect(existsSync(out)).toBe(false);
  });
});
