import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { limits, Refusal } from '../../shared/contract/index.ts';
import { sineSource, waveOf } from './support/waves.ts';

// Input made to do harm meets a refusal of a readable size, soon, and never another error.

function refusalOf(input: unknown): Refusal {
  try {
    buildTable(input);
  } catch (error) {
    if (error instanceof Refusal) return error;
    throw error;
  }
  throw new Error('taken');
}

const wrapped = (times: number, wrap: (inner: unknown) => unknown, innermost: unknown) => {
  let nested = innermost;
  for (let i = 0; i < times; i += 1) nested = wrap(nested);
  return nested;
};
const mixAround = (inner: unknown) => ({
  kind: 'mix',
  operation: 'sum',
  parts: [{ gain: 1, source: inner }],
});

describe('hostile input', () => {
  it.each<[string, () => unknown]>([
    [
      '100,000 mixes in one another',
      () => ({ ...waveOf(), source: wrapped(100_000, mixAround, sineSource) }),
    ],
    [
      '100,000 mixes as the last of 16 parts',
      () => ({
        ...waveOf(),
        source: wrapped(
          100_000,
          (inner) => ({
            kind: 'mix',
            operation: 'sum',
            parts: [
              { gain: 1, source: sineSource },
              { gain: 1, source: inner },
            ],
          }),
          sineSource,
        ),
      }),
    ],
    [
      'a mix that holds itself',
      () => {
        const parts: unknown[] = [];
        const source = { kind: 'mix', operation: 'sum', parts };
        parts.push({ gain: 1, source });
        return { ...waveOf(), source };
      },
    ],
    ['100,000 lists in one another', () => ({ ...waveOf(), name: wrapped(100_000, (inner) => [inner], 1) })],
    [
      'parts of 100,000 lists',
      () => ({
        ...waveOf(),
        source: { ...mixAround(sineSource), parts: wrapped(100_000, (inner) => [inner], 1) },
      }),
    ],
    [
      'a transfer of 100,000 objects',
      () => ({ ...waveOf(), level: { transfer: wrapped(100_000, (gamma) => ({ gamma }), 1) } }),
    ],
    [
      '200,000 unknown fields',
      () => ({ ...waveOf(), ...Object.fromEntries(Array.from({ length: 200_000 }, (_, i) => [`k${i}`, i])) }),
    ],
    [
      '65,536 words for numbers',
      () => ({
        ...waveOf(),
        source: { kind: 'samples', resampling: 'hold', values: Array.from({ length: 65_536 }, () => 'loud') },
      }),
    ],
    [
      '16 times 65,536 words for numbers',
      () => ({
        ...waveOf(),
        source: {
          kind: 'mix',
          operation: 'sum',
          parts: Array.from({ length: 16 }, () => ({
            gain: 1,
            source: { kind: 'samples', resampling: 'hold', values: Array.from({ length: 65_536 }, () => '') },
          })),
        },
      }),
    ],
    [
      'two million values',
      () => ({
        ...waveOf(),
        source: { kind: 'samples', resampling: 'hold', values: new Array(2_000_000).fill(0.5) },
      }),
    ],
    [
      '4,096 points in reverse',
      () => ({
        ...waveOf(),
        source: {
          kind: 'points',
          interpolation: 'step',
          points: Array.from({ length: 4096 }, (_, i) => ({ x: (4095 - i) / 4096, y: 0 })),
        },
      }),
    ],
    ['a name of eight million characters', () => ({ ...waveOf(), name: 'x'.repeat(8_000_000) })],
    ['a field named by a million characters', () => ({ ...waveOf(), ['x'.repeat(1_000_000)]: 1 })],
  ])('%s', { timeout: 60_000 }, (_what, make) => {
    const refusal = refusalOf(make());
    expect(refusal.problems.length).toBeLessThanOrEqual(limits.problemsShown);
    expect(refusal.message.length).toBeLessThan(20_000);
  });
});

describe('signals that cannot be levelled', () => {
  const zero = { harmonic: 1, amplitude: 0, phaseDeg: 0 };
  const up = { harmonic: 3, amplitude: 0.7, phaseDeg: 20 };
  const down = { harmonic: 3, amplitude: 0.7, phaseDeg: 200 };
  const huge = { harmonic: 1, amplitude: 1e308, phaseDeg: 0 };
  type Parts = Parameters<typeof waveOf>[0];
  const ofPartials = (...partials: (typeof zero)[]) => ({ kind: 'harmonics' as const, partials });

  it.each<[string, NonNullable<Parts>]>([
    ['all zero', { source: ofPartials(zero) }],
    ['partials that cancel', { source: ofPartials(up, down) }],
    ['partials that cancel, spanned', { source: ofPartials(up, down), level: { normalise: 'span' } }],
    [
      'cancelling partials around an offset, its mean removed',
      { source: { ...ofPartials(up, down), offset: 0.3 }, level: { removeMean: true } },
    ],
    ['partials above the limit alone', { source: ofPartials(up), table: { length: 6 } }],
    ['a constant, spanned', { source: { ...ofPartials(zero), offset: 1 }, level: { normalise: 'span' } }],
    [
      'a constant, its mean removed',
      { source: { ...ofPartials(zero), offset: 1 }, level: { removeMean: true } },
    ],
    [
      'a product with nothing',
      {
        source: {
          kind: 'mix',
          operation: 'product',
          parts: [
            { gain: 1, source: ofPartials(up) },
            { gain: 0, source: ofPartials(up) },
          ],
        },
      },
    ],
    ['a sum beyond a double', { source: ofPartials(huge, huge) }],
    [
      'a mean beyond a double',
      {
        source: { ...ofPartials({ ...huge, amplitude: 1e307 }), offset: 1e308 },
        level: { removeMean: true },
      },
    ],
    [
      'a mean beyond a double, not normalised',
      {
        source: { ...ofPartials({ ...huge, amplitude: 1e307 }), offset: 1e308 },
        level: { removeMean: true, normalise: 'none' },
      },
    ],
    ['a span beyond a double', { source: ofPartials(huge), level: { normalise: 'span' } }],
    [
      'a product beyond a double',
      {
        source: {
          kind: 'mix',
          operation: 'product',
          parts: [
            { gain: 1e200, source: ofPartials(up) },
            { gain: 1e200, source: ofPartials(up) },
          ],
        },
      },
    ],
  ])('%s', (_what, parts) => {
    const { problems } = refusalOf(waveOf(parts));
    expect(problems).toMatchObject([{ path: 'source' }]);
    expect(problems[0].value).toMatch(
      /^a (zero signal|constant signal|signal beyond the range of a double)$/,
    );
  });

  it('a zero signal is a table where nothing is to be normalised', () => {
    const { codes } = buildTable(waveOf({ source: ofPartials(zero), level: { normalise: 'none' } }));
    expect(new Set(codes)).toEqual(new Set([128]));
  });
});
