import { describe, expect, it } from 'vitest';
import { tabulate } from '../../shared/build-table.ts';
import { checkDefinition, Refusal, type Definition, type Problem } from '../../shared/contract/index.ts';
import { mendsFor } from '../../src/features/bench/problems/mends.ts';
import { examples } from '../../src/features/bench/state/examples.ts';

const [fogSignal, , lampFade] = examples.map(({ work }) => work.definition);

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
      ['Use full span', 'Go back to bipolar'],
    ],
    ['a level of 3', withLevel({ level: 3 }), ['Use 1']],
    ['a level below 0', withLevel({ level: -0.5 }), ['Use 0']],
    [
      'a bent lamp fade made bipolar',
      withTable({ range: 'bipolar' }, lampFade),
      ['Use no transfer curve', 'Go back to unipolar'],
    ],
    ['a zero signal', silent, ['Do not normalise']],
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
