import { describe, expect, test } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { rmsOfVoice, toneHzOf } from '../../shared/listening/index.ts';
import { lsbOf } from '../../shared/quantiser/index.ts';
import { compareCodes } from '../../src/features/reviews/compare/code-differences.ts';
import { compareFigures } from '../../src/features/reviews/compare/figure-differences.ts';
import { matchLoudness } from '../../src/features/reviews/compare/match-loudness.ts';

function built(table: DefinitionInput['table'], change: Partial<DefinitionInput> = {}) {
  const made = buildTable({
    schema: 1,
    name: 'Tone',
    source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
    table,
    ...change,
  });
  const lsb = lsbOf(made.definition.table);
  return { ...made, lsb, errorLsb: made.values.map((value, k) => (value - made.cycle[k]) / lsb) };
}

describe('codes of two tables', () => {
  test('are compared entry by entry, the largest difference first', () => {
    const before = built({ length: 8, bits: 8 });
    const codes = Uint16Array.from(before.codes);
    codes[5] += 3;
    codes[2] -= 7;
    codes[6] += 3;
    const compared = compareCodes(before, { ...before, codes }, 2);
    expect(compared).toMatchObject({ kind: 'entry-by-entry', unit: 'codes', count: 3 });
    if (compared.kind !== 'entry-by-entry') throw new Error('unreachable');
    expect([...compared.differences]).toEqual([0, 0, -7, 0, 0, 3, 3, 0]);
    expect(compared.largest).toEqual([
      { index: 2, before: before.codes[2], after: before.codes[2] - 7, difference: -7 },
      { index: 5, before: before.codes[5], after: before.codes[5] + 3, difference: 3 },
    ]);
  });

  test('of another depth are compared by what they stand for, in LSB of the later', () => {
    const [coarse, fine] = [built({ length: 64, bits: 8 }), built({ length: 64, bits: 12 })];
    const compared = compareCodes(coarse, fine);
    if (compared.kind !== 'entry-by-entry') throw new Error('unreachable');
    expect(compared.unit).toBe('LSB');
    // Each lies within half of its own LSB of the same curve; an LSB of 8 bits is 4095/255 of one of 12.
    const most = (0.5 * 4095) / 255 + 0.5;
    for (const difference of compared.differences) expect(Math.abs(difference)).toBeLessThanOrEqual(most);
    expect(Math.max(...compared.differences)).toBeGreaterThan(2);
  });

  test('of another length are not compared', () => {
    expect(compareCodes(built({ length: 8 }), built({ length: 16 }))).toEqual({
      kind: 'other-length',
      before: 8,
      after: 16,
    });
  });
});

describe('figures of two tables', () => {
  const judged = (before: ReturnType<typeof built>, after: ReturnType<typeof built>) =>
    Object.fromEntries(compareFigures(before, after).map((row) => [row.id, row]));

  test('say what is better and what is worse, with sign', () => {
    const { snrDb, tableBytes, enobBits, crestFactor } = judged(
      built({ length: 256, bits: 8 }),
      built({ length: 256, bits: 10 }),
    );
    expect(snrDb).toMatchObject({ judgement: 'better', difference: expect.stringMatching(/^\+1\d\.\d$/) });
    expect(tableBytes).toMatchObject({
      before: '256',
      after: '512',
      unit: 'bytes',
      difference: '+256',
      judgement: 'worse',
    });
    expect(enobBits.judgement).toBe('better');
    expect(crestFactor.judgement).toBe('other');
  });

  test('tell counts to the last one', () => {
    const { tableBytes } = judged(built({ length: 1024, bits: 8 }), built({ length: 5001, bits: 8 }));
    expect(tableBytes).toMatchObject({ before: '1024', after: '5001', difference: '+3977' });
  });

  test('tell what computing alone leaves as nothing', () => {
    const sine = built({ length: 64, bits: 8 });
    const withMean = (meanErrorLsb: number) => ({ ...sine, report: { ...sine.report, meanErrorLsb } });
    expect(judged(withMean(1e-15), withMean(-2e-16)).meanErrorLsb).toMatchObject({
      after: '0',
      difference: '0',
      judgement: 'same',
    });
  });

  test('leave distortion unjudged where the wave has partials of its own', () => {
    const source = {
      kind: 'harmonics' as const,
      partials: [1, 2].map((harmonic) => ({ harmonic, amplitude: 1 / harmonic, phaseDeg: 0 })),
    };
    const { sinadDb, snrDb } = judged(
      built({ length: 256, bits: 8 }, { source }),
      built({ length: 256, bits: 12 }, { source }),
    );
    expect(sinadDb.judgement).toBe('other');
    expect(snrDb.judgement).toBe('better');
  });

  test('are the same where nothing differs, and an exact table is better than any SNR', () => {
    const sine = built({ length: 64, bits: 8 });
    for (const { judgement, difference } of compareFigures(sine, sine)) {
      expect(judgement).toBe('same');
      expect(['0', '']).toContain(difference);
    }
    const exact = built(
      { length: 4, bits: 8, scale: 'mid-tread' },
      { level: { normalise: 'none', level: 0.5 } },
    );
    expect(exact.report.exact).toBe(true);
    expect(judged(sine, exact).snrDb).toMatchObject({ after: 'exact', difference: '', judgement: 'better' });
  });
});

describe('two tables at equal loudness', () => {
  const compared = ({ values, definition }: ReturnType<typeof built>) => ({
    values,
    table: definition.table,
  });

  test('sound with one RMS and one tone, whatever their level, range, length and cycles', () => {
    const loud = built({ length: 96, bits: 12, cycles: 3 });
    const soft = built({ length: 256, bits: 10, cycles: 2, range: 'unipolar' }, { level: { level: 0.25 } });
    const matched = matchLoudness(compared(loud), compared(soft), 440, 48_000);
    if (matched.kind !== 'matched') throw new Error(matched.kind);
    const { voices, drive } = matched.sound;
    expect(matched.turnedDownDb.a).toBeGreaterThan(6);
    expect(matched.turnedDownDb.b).toBe(0);
    const [a, b] = [voices.a, voices.b].map((voice) => rmsOfVoice(voice, drive, 48_000));
    expect(a / b).toBeCloseTo(1, 9);
    // Neither is louder than alone: the weaker one is as it was.
    expect(voices.b.gain).toBe(1);
    for (const { values, cycles, drive: own = drive } of Object.values(voices)) {
      expect(toneHzOf(own, values.length, cycles)).toBeCloseTo(440, 9);
    }
  });

  test('are refused where one is silent, and however many cycles they hold they are played', () => {
    const sine = built({ length: 64 });
    const flat = built({ length: 64 }, { level: { normalise: 'none', level: 0 } });
    expect(matchLoudness(compared(sine), compared(flat), 220, 48_000)).toEqual({
      kind: 'silent',
      which: 'b',
    });
    expect(matchLoudness(compared(flat), compared(flat), 220, 48_000)).toEqual({
      kind: 'silent',
      which: 'both',
    });
    const long = built({ length: 65_536, cycles: 7 });
    expect(matchLoudness(compared(long), compared(built({ length: 64, cycles: 11 })), 220, 48_000).kind).toBe(
      'matched',
    );
  });
});
