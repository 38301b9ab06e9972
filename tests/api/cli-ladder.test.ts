import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { parseLadder } from '../../shared/contract/index.ts';
import { ladderReport } from '../../shared/output-stage/index.ts';
import { expectOneLine, stepwell } from '../support/command-line.ts';

const ladder = { bits: 6, R: 4700, rHigh: 40, rLow: 25, load: 100_000 };
let folder: string;
let file: string;

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'stepwell-cli-'));
  file = join(folder, 'ladder.json');
  await writeFile(file, JSON.stringify(ladder));
  await stepwell(['--help']);
});
afterAll(() => rm(folder, { recursive: true }));

describe('ladder', () => {
  it('--json prints volts, INL, DNL and currents, as the engine has them', async () => {
    const { status, stdout, stderr } = await stepwell(['ladder', file, '--json']);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    const { volts, inl, dnl, ...figures } = ladderReport(parseLadder(ladder));
    expect(JSON.parse(stdout)).toEqual({
      volts: Array.from(volts),
      inl: Array.from(inl),
      dnl: Array.from(dnl),
      ...figures,
    });
  });

  it('prints figures with units and defers to the data sheet', async () => {
    const { status, stdout } = await stepwell(['ladder', '-'], { input: '{"bits": 2, "R": 1000}' });
    expect(status).toBe(0);
    expect(stdout).toMatch(/^R-2R ladder of 2 bits, R = 1 kΩ\n/);
    expect(stdout).toMatch(/^Code 3 +3\.75 {2}V$/m);
    expect(stdout).toMatch(/^Largest DNL +0\.0000 {2}LSB$/m);
    expect(stdout).toMatch(/^Pin +1\.5625 {2}mA +at most, bit 0 at code 1$/m);
    expect(stdout).toMatch(/^Shorted: pin +2\.5 {2}mA/m);
    expect(stdout).toMatch(/data sheet/);
  });

  it.each<[string, string, RegExp]>([
    ['a negative R', '{"bits": 2, "R": -1}', /^R: -1 is not allowed; allowed: a number from 1e-9 to 1e12 Ω$/],
    [
      'rungs of the wrong number',
      '{"bits": 2, "R": 1, "rungs": [2]}',
      /^rungs: a list of 1 is not allowed; allowed: 2 resistances, one for each bit$/,
    ],
    ['no ladder', '[]', /^ladder: a list of 0 is not allowed; allowed: /],
    ['no JSON', '{"bits": 2,', /^standard input, line 1, column 12: /],
  ])('refuses %s', async (_what, input, line) => {
    expectOneLine(await stepwell(['ladder', '-', '--json'], { input }), line);
  });

  it('refuses a call without a file', async () => {
    expectOneLine(await stepwell(['ladder']), /^usage: missing required argument 'LADDER\.json'; allowed: /);
  });
});
