import { describe, expect, it } from 'vitest';
import { tabulate } from '../../shared/build-table.ts';
import { parseDefinition, type DefinitionInput } from '../../shared/contract/index.ts';
import { figureGroupsOf } from '../../src/features/bench/figures/figures.ts';
import { fixed, significant } from '../../src/features/bench/numbers.ts';
import { examples } from '../../src/features/bench/state/examples.ts';
import type { TableAnswer } from '../../src/workers/engine-messages.ts';

const figuresOf = (input: DefinitionInput) =>
  figureGroupsOf(tabulate(parseDefinition(input)) as TableAnswer).flatMap(({ figures }) => figures);

const sine = (
  amplitude: number,
  table: DefinitionInput['table'],
  level: DefinitionInput['level'] = {},
): DefinitionInput => ({
  schema: 1,
  name: 'sine',
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude, phaseDeg: 0 }] },
  table,
  level,
});

const shown = (figures: ReturnType<typeof figuresOf>, id: string) => {
  const found = figures.find((figure) => figure.id === id);
  if (found === undefined) throw new Error(`no figure ${id}`);
  return found;
};

describe('the figures', () => {
  it('of any example explain themselves and give a reason wherever one is missing', () => {
    for (const { work } of examples) {
      for (const figure of figuresOf(work.definition)) {
        expect(figure.meaning).toMatch(/\.$/);
        expect(figure.formula).not.toBe('');
        expect(figure.good).toMatch(/\.$/);
        expect(figure.value === '–' ? figure.missing : (figure.missing ?? '.')).toMatch(/\.$/);
        expect(figure.value).not.toMatch(/NaN|undefined|null|Infinity/);
      }
    }
  });

  it('warn that converter figures say little about a wave of several partials', () => {
    const notes = examples.map(
      ({ work }) => figureGroupsOf(tabulate(work.definition) as TableAnswer)[1].note,
    );
    expect(notes.map((note) => note !== undefined)).toEqual([true, true, true, false]);
  });

  it('call a silent wave silent and not exact', () => {
    const figures = figuresOf(sine(0, { length: 64, bits: 8 }, { normalise: 'none' }));
    expect(shown(figures, 'snrDb')).toMatchObject({ value: '–', tone: undefined });
    expect(shown(figures, 'snrDb').missing).toMatch(/does not move/);
  });

  it('call a wave exact that falls on codes', () => {
    // At the centres of four entries a sine is ±sin 45°, which the peak makes ±1: a square wave of one bit.
    const figures = figuresOf(sine(1, { length: 4, bits: 1, sampleAt: 'centre' }));
    expect(shown(figures, 'snrDb')).toMatchObject({ value: 'exact', tone: 'good' });
    expect(shown(figures, 'unwantedDb').value).toBe('none');
    expect(shown(figures, 'sinadDb').value).toBe('–');
  });

  it('mark clipping', () => {
    const figures = figuresOf(sine(1.2, { length: 64, bits: 8 }, { normalise: 'none' }));
    expect(shown(figures, 'clipped')).toMatchObject({ tone: 'attention', unit: 'samples' });
    expect(Number(shown(figures, 'clipped').value)).toBeGreaterThan(10);
  });
});

describe('numbers for reading', () => {
  it.each([
    [0, '0'],
    [-0, '0'],
    [-0.05468, '−0.0547'],
    [1e-9, '0.000000001'],
    [65_536, '65,500'],
  ])('%d has three significant digits: %s', (value, text) => {
    expect(significant(value)).toBe(text);
  });

  it.each([
    [49.92, '49.9'],
    [-60.96, '−61.0'],
    [-0.01, '0.0'],
  ])('%d to a tenth is %s', (value, text) => {
    expect(fixed(value, 1)).toBe(text);
  });
});
