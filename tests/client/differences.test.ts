import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parseDefinition, type DefinitionInput } from '../../shared/contract/index.ts';
import { differencesOf } from '../../src/features/bench/save/differences.ts';
import { examples } from '../../src/features/bench/state/examples.ts';

const tone = (change: Partial<DefinitionInput> = {}) =>
  parseDefinition({
    schema: 1,
    name: 'Tone',
    source: {
      kind: 'harmonics',
      partials: [
        { harmonic: 1, amplitude: 1, phaseDeg: 0 },
        { harmonic: 3, amplitude: 0.44, phaseDeg: 30 },
      ],
    },
    ...change,
  });

describe('how two definitions differ, in words', () => {
  test('in nothing where they are alike', () => {
    for (const { work } of examples) {
      expect(differencesOf(work.definition, structuredClone(work.definition))).toEqual({
        differences: [],
        others: 0,
      });
    }
  });

  test('in settings, by the names that the form has for them', () => {
    const mine = tone({ table: { bits: 10, complement: true, coding: 'twos-complement' } });
    const theirs = tone({ name: 'Tone-2', level: { level: 0.5 }, table: { startPhaseDeg: 90 } });
    expect(differencesOf(mine, theirs).differences).toEqual([
      { name: 'Name of the wave', mine: 'Tone', theirs: 'Tone-2' },
      { name: 'Level', mine: '1 of full scale', theirs: '0.5 of full scale' },
      { name: 'Bit depth', mine: '10 bits', theirs: '8 bits' },
      { name: 'Start phase', mine: '0°', theirs: '90°' },
      { name: 'Coding', mine: 'two’s complement', theirs: 'offset binary' },
      { name: 'Inverted codes', mine: 'yes', theirs: 'no' },
    ]);
  });

  test('in partials by their harmonic, wherever they stand', () => {
    const theirs = tone({
      source: {
        kind: 'harmonics',
        partials: [
          { harmonic: 3, amplitude: 0.5, phaseDeg: 30 },
          { harmonic: 1, amplitude: 1, phaseDeg: 0 },
          { harmonic: 8, amplitude: 0.12, phaseDeg: 180 },
        ],
      },
    });
    expect(differencesOf(tone(), theirs).differences).toEqual([
      { name: 'Harmonic 3, amplitude', mine: '0.44', theirs: '0.5' },
      { name: 'Harmonic 8, amplitude', mine: '–', theirs: '0.12' },
      { name: 'Harmonic 8, phase', mine: '–', theirs: '180°' },
    ]);
  });

  test('in the kind of their source, as a whole', () => {
    const [{ name, mine, theirs }] = differencesOf(tone(), {
      ...tone(),
      source: examples[1].work.definition.source,
    }).differences;
    expect([name, mine, theirs]).toEqual(['Shape', '2 partials', '19 points, spline']);
  });

  test('counts what it does not list', () => {
    const many = (amplitude: number) =>
      tone({
        source: {
          kind: 'harmonics',
          partials: Array.from({ length: 40 }, (_, k) => ({ harmonic: k + 1, amplitude, phaseDeg: 0 })),
        },
      });
    const { differences, others } = differencesOf(many(0.25), many(0.5));
    expect([differences.length, others]).toEqual([12, 28]);
  });

  test('the other way round the sides are changed over', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 16 }),
        fc.integer({ min: 2, max: 500 }),
        fc.boolean(),
        (bits, length, removeMean) => {
          const [one, two] = [tone(), tone({ table: { bits, length }, level: { removeMean } })];
          const swapped = differencesOf(two, one).differences.map(({ name, mine, theirs }) => ({
            name,
            mine: theirs,
            theirs: mine,
          }));
          expect(swapped).toEqual(differencesOf(one, two).differences);
        },
      ),
      { seed: 3 },
    );
  });
});
