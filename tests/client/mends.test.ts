import { describe, expect, it } from 'vitest';
import { tabulate } from '../../shared/build-table.ts';
import { checkDefinition, Refusal, type Definition, type Problem } from '../../shared/contract/index.ts';
import { mendsFor } from '../../src/features/bench/problems/mends.ts';
import { examples } from '../../src/features/bench/state/examples.ts';

const [fogSignal, , lampFade, selfTest] = examples.map(({ work }) => work.definition);

/** Voltages of 8 bits, evenly stepped but for the middle. */
const levels = Array.from({ length: 256 }, (_, code) => code * 0.02 + (code === 128 ? 0.015 : 0));

const withTable = (table: Partial<Definition['table']>, of = fogSignal): Definition => ({
  ...of,
  table: { ...of.table, ...table },
});
const withLevel = (level: Partial<Definition['level']>, of = fogSignal): Definition => ({
  ...of,
  level: { ...of.level, ...level },
});

/** Everything wrong with a draft, whether the parser or the engine finds it. */
function problemsOf(draft: Definition): readonly Problem[] {
  const checked = checkDefinition(draft);
  if ('problems' in checked) return checked.problems;
  try {
    tabulate(checked.definition);
    return [];
  } catch (error) {
    if (error instanceof Refusal) return error.problems;
    throw error;
  }
}

const silent: Definition = {
  ...fogSignal,
  source: { kind: 'harmonics', offset: 0, partials: [{ harmonic: 3, amplitude: 0, phaseDeg: 0 }] },
};

describe('a mend', () => {
  it.each<[string, Definition, string[]]>([
    ['17 bits', withTable({ bits: 17 }), ['Use 16']],
    ['half a bit', withTable({ bits: 0.5 }), ['Use 1']],
    ['1 entry', withTable({ length: 1 }), ['Use 2']],
    ['endless entries', withTable({ length: Infinity }), ['Use 65536']],
    ['40 cycles in 64 entries', withTable({ cycles: 40, length: 64 }), ['Use 31']],
    ['−90 degrees', withTable({ startPhaseDeg: -90 }), ['Use 270°']],
    ['360 degrees', withTable({ startPhaseDeg: 360 }), ['Use 0°']],
    [
      'mid-tread, unipolar',
      withTable({ scale: 'mid-tread', range: 'unipolar' }),
      ['Use full span', 'Make the range bipolar'],
    ],
    ['a level of 3', withLevel({ level: 3 }), ['Use 1']],
    ['a level below 0', withLevel({ level: -0.5 }), ['Use 0']],
    [
      'a bent lamp fade made bipolar',
      withTable({ range: 'bipolar' }, lampFade),
      ['Use no transfer curve', 'Make the range unipolar'],
    ],
    ['a zero signal', silent, ['Do not normalise']],
    ['a seed of −1', withTable({ dither: 'triangular', seed: -1 }), ['Use 0']],
    [
      'a quarter of 254 entries',
      withTable({ fold: 'quarter', sampleAt: 'centre', length: 254 }),
      ['Use 256', 'Store the whole table'],
    ],
    [
      'a quarter of 2 cycles',
      withTable({ fold: 'quarter', sampleAt: 'centre', cycles: 2 }),
      ['Use 1', 'Store the whole table'],
    ],
    [
      'a quarter sampled at the start',
      withTable({ fold: 'quarter' }),
      ['Sample at the centre', 'Store the whole table'],
    ],
    [
      'a quarter rounded down',
      withTable({ fold: 'quarter', sampleAt: 'centre', rounding: 'down' }),
      ['Round half up', 'Store the whole table'],
    ],
    [
      'a quarter of a dithered sine',
      withTable({ fold: 'quarter', sampleAt: 'centre', dither: 'triangular' }, selfTest),
      ['Store the whole table', 'Use neither dither nor shaping'],
    ],
    [
      'dither with measured levels',
      withTable({ levels, dither: 'triangular' }),
      ['Use no dither', 'Clear the measured levels'],
    ],
    [
      'shaping with measured levels',
      withTable({ levels, shaping: 2 }),
      ['Use no shaping', 'Clear the measured levels'],
    ],
    [
      'rounding down with measured levels',
      withTable({ levels, rounding: 'down' }),
      ['Round half up', 'Clear the measured levels'],
    ],
    [
      '128 levels for 8 bits',
      withTable({ levels: levels.slice(0, 128) }),
      ['Clear the measured levels', 'Use 7 bits'],
    ],
    ['equal levels', withTable({ levels: levels.map(() => 1) }), ['Clear the measured levels']],
  ])('puts %s right, whichever is taken', (_what, draft, labels) => {
    const [problem] = problemsOf(draft);
    const mends = mendsFor(problem, draft);
    expect(mends.map(({ label }) => label)).toEqual(labels);
    for (const { apply } of mends) {
      expect(problemsOf(apply(draft)).map(({ path }) => path)).not.toContain(problem.path);
    }
  });

  it('is not offered for what has no near value', () => {
    for (const draft of [
      withTable({ bits: Number.NaN }),
      withTable({ startPhaseDeg: Infinity }),
      { ...fogSignal, name: '' },
    ]) {
      const [problem] = problemsOf(draft);
      expect(mendsFor(problem, draft)).toEqual([]);
    }
  });
});
