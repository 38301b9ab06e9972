import { describe, expect, it } from 'vitest';
import { smallestThatMeets, sizeSearch } from '../../shared/size-search/index.ts';
import { leavesOut } from '../../src/features/bench/size-search/left-out.ts';
import { meets, readLimits, sayLimits } from '../../src/features/bench/size-search/read-limits.ts';
import { examples } from '../../src/features/bench/state/examples.ts';

describe('limits as they are typed', () => {
  it.each([
    ['SNR ≥ 45 dB, ≤ 512 bytes', { snrDb: 45, tableBytes: 512 }],
    ['snr at least 45 dB and at most 1 KiB', { snrDb: 45, tableBytes: 1_024 }],
    ['45 dB; 2kB', { snrDb: 45, tableBytes: 2_000 }],
    ['unwanted <= −50 dB', { unwantedDb: -50 }],
    ['-50 dB, size 64', { unwantedDb: -50, tableBytes: 64 }],
    ['SNR > 0 dB', { snrDb: 0 }],
    ['', {}],
  ])('%j', (text, limits) => {
    expect(readLimits(text)).toEqual({ limits });
  });

  it.each(['45', 'SNR ≤ 45 dB', '≥ 512 bytes', 'unwanted ≥ −50 dB', 'SNR 45 bytes', 'loud', '40 dB, 45 dB'])(
    'refuses %j and names it',
    (text) => {
      const read = readLimits(text);
      expect(read).toHaveProperty('fault', expect.stringContaining(`“${text.split(', ').at(-1)}”`));
    },
  );

  it('are said back without doubt', () => {
    expect(sayLimits({ snrDb: 45, unwantedDb: -50, tableBytes: 2_000 })).toBe(
      'Read as SNR at least 45 dB, unwanted line at most −50 dB, at most 2,000 bytes.',
    );
  });
});

it('a cell keeps limits just where the engine would choose it if it were the only one', () => {
  const { definition } = examples[0].work;
  const cells = [...sizeSearch(definition, { lengths: [32, 100, 256], bits: [1, 4, 8, 12] })];
  for (const limits of [{}, { snrDb: 40 }, { unwantedDb: -50 }, { snrDb: 20, tableBytes: 100 }]) {
    for (const cell of cells) expect(meets(cell, limits)).toBe(smallestThatMeets([cell], limits) !== null);
  }
});

it('lengths that leave a heard partial out are known, in mixes too', () => {
  const { definition } = examples[0].work;
  // The highest partial is harmonic 8: 2·8 < N.
  expect(leavesOut(definition, 16)).toBe(true);
  expect(leavesOut(definition, 17)).toBe(false);
  const { source } = definition;
  const mix = {
    ...definition,
    source: { kind: 'mix' as const, operation: 'sum' as const, parts: [{ gain: 1, source }] },
  };
  expect(leavesOut(mix, 16)).toBe(true);
  expect(leavesOut({ ...definition, table: { ...definition.table, cycles: 3 } }, 48)).toBe(true);
});
