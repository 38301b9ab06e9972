import { describe, expect, test } from 'vitest';
import { parseDefinition, type DefinitionInput } from '../../shared/contract/index.ts';
import type { Drive } from '../../shared/listening/index.ts';
import { planSide, type OnBench } from '../../src/features/bench/listen/blind/plan-side.ts';
import { choiceOf, type SideChoice } from '../../src/features/bench/listen/blind/side-choice.ts';
import { resultText, sayMeaning, sayTurnedDown } from '../../src/features/bench/listen/blind/words.ts';

const definitionWith = (table: DefinitionInput['table']) =>
  parseDefinition({
    schema: 1,
    name: 'Tone',
    source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
    table,
  });
const benchOf = (table: DefinitionInput['table'], drive: Drive): OnBench => ({
  definition: definitionWith(table),
  drive,
});
const loop = (sampleRateHz: number): Drive => ({ kind: 'loop', sampleRateHz });
const plan = (part: Partial<SideChoice> & Pick<SideChoice, 'kind'>, bench: OnBench) =>
  planSide({ ...choiceOf(part.kind), ...part }, bench, null);

describe('what A or B can be', () => {
  // 3 cycles in 240 entries at 24 kHz: a tone of 300 Hz.
  const bench = benchOf({ length: 240, bits: 8, cycles: 3 }, loop(24_000));

  test('the bench’s own curve and table are taken as they are', () => {
    expect(plan({ kind: 'ideal' }, bench)).toMatchObject({ kind: 'own', form: 'curve' });
    expect(plan({ kind: 'table' }, bench)).toEqual({
      kind: 'own',
      form: 'staircase',
      words: 'the table of 8 bits',
    });
  });

  test('fewer bits are the definition quantised anew', () => {
    expect(plan({ kind: 'fewer', bits: 5 }, bench)).toEqual({
      kind: 'build',
      definition: { ...bench.definition, table: { ...bench.definition.table, bits: 5 } },
      words: 'the wave at 5 bits',
    });
    expect(plan({ kind: 'fewer' }, bench)).toMatchObject({ definition: { table: { bits: 6 } } });
    expect(plan({ kind: 'fewer', bits: 8 }, bench)).toMatchObject({
      kind: 'fault',
      fault: expect.stringContaining('1 to 7'),
    });
    const levels = [0, 1, 2, 3.1];
    expect(
      plan({ kind: 'fewer', bits: 1 }, benchOf({ length: 64, bits: 2, levels }, loop(8000))),
    ).toMatchObject({
      kind: 'fault',
      fault: expect.stringContaining('measured levels'),
    });
  });

  test('another sample rate is the length that gives the tone, and the rate that follows from it', () => {
    // fs'·K/tone = 10 000·3/300 = 100 entries, exactly; 10 040 gives 100.4 and so 100 too.
    for (const wanted of [10_000, 10_040]) {
      expect(plan({ kind: 'rate', sampleRateHz: wanted }, bench)).toMatchObject({
        kind: 'build',
        definition: { table: { length: 100, cycles: 3, bits: 8 } },
        drive: { kind: 'loop', sampleRateHz: 10_000 },
        note: '100 entries give the same tone, 300\u00a0Hz, at 10\u00a0kHz.',
      });
    }
    expect(plan({ kind: 'rate' }, bench)).toMatchObject({ definition: { table: { length: 120 } } });
  });

  test('no fewer than 2K + 1 entries, and no more than a table can have', () => {
    expect(plan({ kind: 'rate', sampleRateHz: 700 }, bench)).toMatchObject({
      definition: { table: { length: 7 } },
      drive: { sampleRateHz: 700 },
    });
    expect(plan({ kind: 'rate', sampleRateHz: 640 }, bench)).toMatchObject({
      kind: 'fault',
      fault: expect.stringMatching(
        /has 6 entries; allowed: 7 to 65,536, sample rates from 700.Hz to 6\.5536.MHz/,
      ),
    });
    expect(plan({ kind: 'rate', sampleRateHz: 1e8 }, bench).kind).toBe('fault');
  });

  test('an accumulator at another rate takes the nearest step word', () => {
    const drive: Drive = { kind: 'accumulator', sampleRateHz: 32_000, accumulatorBits: 16, stepWord: 901 };
    const driven = benchOf({ length: 256, bits: 8 }, drive);
    // 901·32000/2^16 = 439.94 Hz; at 20 kHz that is 1441.6 steps.
    expect(plan({ kind: 'rate', sampleRateHz: 20_000 }, driven)).toMatchObject({
      kind: 'build',
      definition: { table: { length: 256 } },
      drive: { ...drive, sampleRateHz: 20_000, stepWord: 1442 },
    });
    expect(plan({ kind: 'rate', sampleRateHz: 850 }, driven)).toMatchObject({ kind: 'fault' });
    expect(plan({ kind: 'rate', sampleRateHz: 1e8 }, driven)).toMatchObject({ kind: 'fault' });
  });

  test('a revision is played at the bench’s tone, whatever its length and cycles', () => {
    const stored = {
      definition: definitionWith({ length: 100, cycles: 2, bits: 10 }),
      words: 'Chirp, revision 4',
    };
    const picked = { table: 'chirp', number: 4 };
    expect(plan({ kind: 'revision' }, bench)).toMatchObject({ kind: 'fault' });
    expect(plan({ kind: 'revision', picked }, bench)).toEqual({ kind: 'waiting' });
    expect(planSide({ ...choiceOf('revision'), picked }, bench, stored)).toMatchObject({
      kind: 'build',
      definition: stored.definition,
      drive: { kind: 'loop', sampleRateHz: 15_000 },
      words: 'Chirp, revision 4',
    });
    // An accumulator cannot index 100 entries.
    const drive: Drive = { kind: 'accumulator', sampleRateHz: 32_768, accumulatorBits: 16, stepWord: 600 };
    expect(
      planSide({ ...choiceOf('revision'), picked }, benchOf({ length: 256, bits: 8 }, drive), stored),
    ).toMatchObject({
      drive: { kind: 'loop', sampleRateHz: 15_000 },
      note: expect.stringContaining('as a loop'),
    });
  });
});

describe('the result in words', () => {
  const loudness = { kind: 'matched', turnedDownDb: { a: 0, b: 1.234 } } as never;
  const x = (right: number, wrong: number) => [
    ...Array.from({ length: right }, () => ({ x: 'a', said: 'a' }) as const),
    ...Array.from({ length: wrong }, () => ({ x: 'b', said: 'a' }) as const),
  ];
  const testOf = (right: number, wrong: number, end: 'complete' | 'given-up' = 'complete') => ({
    id: 1,
    run: { trials: 16, answered: x(right, wrong), x: null, end },
    words: { a: 'the ideal curve', b: 'the wave at 5 bits' },
    wave: 'Tone',
    loudness,
  });

  test('says what the probability means, and what an early end does to it', () => {
    expect(sayMeaning(testOf(12, 4))).toContain('in one of 26 such runs');
    expect(sayMeaning(testOf(11, 5))).toContain('does not show a difference');
    expect(sayMeaning(testOf(6, 0, 'given-up'))).toContain('ended early');
    expect(sayMeaning(testOf(0, 0, 'given-up'))).toBe('Nothing was answered.');
  });

  test('holds the key and all that it takes to judge it', () => {
    const text = resultText(testOf(12, 4));
    expect(text.split('\n')).toHaveLength(8 + 16);
    expect(text).toContain('12 of 16 right; 16 trials were chosen beforehand');
    expect(text).toContain('by guessing: 0.0384');
    expect(text).toContain('13\tB\tA\twrong');
    expect(text).toContain('B is turned down by 1.23');
  });

  test('does not speak of a hair’s breadth', () => {
    expect(sayTurnedDown({ turnedDownDb: { a: 0.004, b: 0 } } as never)).toContain('neither is changed');
  });
});
