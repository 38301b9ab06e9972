import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { expectOneLine, fogJson, stepwell } from '../support/command-line.ts';

beforeAll(async () => {
  // The first call builds the command line where it has to.
  await stepwell(['--help']);
});

const spurs = (input: string, accumulatorBits: string, stepWord: string, ...more: string[]) =>
  stepwell(['spurs', '-', '--accumulator-bits', accumulatorBits, '--step-word', stepWord, ...more], {
    input,
  });
const table = (length: number) => fogJson({ table: { length, bits: 8 } });

// Results of an independent model of the engine specification (NumPy).
const golden = JSON.parse(readFileSync(new URL('../engine/golden/golden.json', import.meta.url), 'utf8')) as {
  accumulators: ({ definition: object; accumulatorBits: number; stepWord: number } & Figures)[];
};
interface Figures {
  period: number;
  carrierBin: number;
  worstOtherDbc: number;
  worstOtherBin: number;
  snrDb: number;
}

describe('spurs', () => {
  it.each(golden.accumulators)(
    '--json prints the five figures: $accumulatorBits bits, step word $stepWord',
    async ({ definition, accumulatorBits, stepWord, worstOtherDbc, snrDb, ...bins }) => {
      const { status, stdout, stderr } = await spurs(
        JSON.stringify(definition),
        String(accumulatorBits),
        String(stepWord),
        '--json',
      );
      expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
      const figures = JSON.parse(stdout) as Figures;
      expect(Object.keys(figures)).toEqual([
        'period',
        'carrierBin',
        'worstOtherDbc',
        'worstOtherBin',
        'snrDb',
      ]);
      expect(figures).toMatchObject(bins);
      expect(figures.worstOtherDbc).toBeCloseTo(worstOtherDbc, 6);
      expect(figures.snrDb).toBeCloseTo(snrDb, 6);
    },
  );

  it('prints figures to read without --json', async () => {
    const { status, stdout } = await spurs(table(256), '24', '4097');
    expect(status).toBe(0);
    expect(stdout).toMatch(/^Fog signal: 256 entries of 8 bits, accumulator of 24 bits, step word 4097\n/);
    expect(stdout).toMatch(/^Period +16777216 {2}samples$/m);
    expect(stdout).toMatch(/^Carrier +bin 4097$/m);
    expect(stdout).toMatch(/^SNR +\d+\.\d\d {2}dB /m);
  });

  it('takes the widest accumulator, and prints null for what does not exist', async () => {
    const wide = await spurs(table(256), '48', '281474976710655', '--json');
    expect(JSON.parse(wide.stdout)).toMatchObject({ period: 2 ** 48, carrierBin: 1 });
    const still = await spurs(
      fogJson({ source: { kind: 'harmonics', offset: 1, partials: [] }, table: { length: 4 } }).replace(
        '"partials":[]',
        '"partials":[{"harmonic":1,"amplitude":0,"phaseDeg":0}]',
      ),
      '8',
      '3',
      '--json',
    );
    expect(JSON.parse(still.stdout)).toEqual({
      period: 256,
      carrierBin: null,
      worstOtherDbc: null,
      worstOtherBin: null,
      snrDb: null,
    });
  });

  it.each([
    [table(100), '16', '1', /^table\.length: 100 is not allowed; allowed: a power of two/],
    [table(256), '7', '1', /^--accumulator-bits: 7 is not allowed; allowed: a whole number from 8 to 48$/],
    [table(256), '49', '1', /^--accumulator-bits: 49 is not allowed; allowed: a whole number from 8 to 48$/],
    [table(256), '16', '0', /^--step-word: 0 is not allowed; allowed: a whole number from 1 to 65535$/],
    [
      table(256),
      '16',
      '65536',
      /^--step-word: 65536 is not allowed; allowed: a whole number from 1 to 65535$/,
    ],
    [table(256), '16', '1.5', /^--step-word: "1\.5" is not allowed; allowed: a whole number in digits/],
    [
      table(256),
      'wide',
      '1',
      /^--accumulator-bits: "wide" is not allowed; allowed: a whole number in digits/,
    ],
    [table(256), '48', '99999999999999999999', /^--step-word: "9{20}" is not allowed/],
    [fogJson({ table: { bits: 17 } }), '16', '1', /^table\.bits: 17 is not allowed/],
  ])('refuses wrong input on one line, with status 2: case %#', async (input, width, step, line) => {
    expectOneLine(await spurs(input, width, step, '--json'), line);
  });

  it('asks for both numbers', async () => {
    expectOneLine(
      await stepwell(['spurs', '-', '--step-word', '1'], { input: table(256) }),
      /^usage: required option '--accumulator-bits <M>' not specified; allowed: stepwell spurs /,
    );
  });
});
