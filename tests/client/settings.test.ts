import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { createCommentSchema, parseDefinition, type DefinitionInput } from '../../shared/contract/index.ts';
import { changedSettings, listSettings } from '../../src/settings/index.ts';
import { anyDefinition } from '../engine/support/definitions.ts';
import { holds } from '../engine/support/seeded.ts';

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

const rows = (before: DefinitionInput, after: DefinitionInput) =>
  changedSettings(parseDefinition(before), parseDefinition(after)).map((change) => Object.values(change));

describe('settings that differ, in words', () => {
  test('with their units, and choices by the names that the form has for them', () => {
    expect(
      rows(
        tone(),
        tone({ level: { level: 0.5 }, table: { bits: 1, startPhaseDeg: 90, dither: 'triangular' } }),
      ),
    ).toEqual([
      ['level.level', 'Level', '1 of full scale', '0.5 of full scale'],
      ['table.bits', 'Bit depth', '8 bits', '1 bit'],
      ['table.startPhaseDeg', 'Start phase', '0°', '90°'],
      ['table.dither', 'Dither', 'none', 'triangular'],
    ]);
    expect(
      rows(
        tone({ table: { length: 1024, rounding: 'half-even', complement: true } }),
        tone({ table: { length: 256, shaping: 2, coding: 'twos-complement' } }),
      ).map(([, ...words]) => words),
    ).toEqual([
      ['Table length', '1,024 entries', '256 entries'],
      ['Rounding', 'half to even', 'half up'],
      ['Noise shaping', 'none', 'order 2'],
      ['Coding', 'offset binary', 'two’s complement'],
      ['Inverted codes', 'yes', 'no'],
    ]);
  });

  test('partials by their harmonic, wherever they stand; the path is where they stand now', () => {
    const after = tone({
      source: {
        kind: 'harmonics',
        partials: [
          { harmonic: 3, amplitude: 0.5, phaseDeg: 30 },
          { harmonic: 1, amplitude: 1, phaseDeg: -12.5 },
        ],
      },
    });
    expect(rows(tone(), after)).toEqual([
      ['source.partials[1].phaseDeg', 'Harmonic 1, phase', '0°', '−12.5°'],
      ['source.partials[0].amplitude', 'Harmonic 3, amplitude', '0.44', '0.5'],
    ]);
    expect(
      rows(
        after,
        tone({ source: { kind: 'harmonics', partials: [{ harmonic: 3, amplitude: 0.5, phaseDeg: 30 }] } }),
      ),
    ).toEqual([
      ['source.partials[1].amplitude', 'Harmonic 1, amplitude', '1', '–'],
      ['source.partials[1].phaseDeg', 'Harmonic 1, phase', '−12.5°', '–'],
    ]);
  });

  test('long lists as a whole, other kinds of shape in a few words, a curve with its exponent', () => {
    const samples = (values: number[]) =>
      tone({ source: { kind: 'samples', values, resampling: 'hold' }, table: { range: 'unipolar' } });
    expect(rows(samples([0, 0.5, 1]), samples([0, 0.25, 0]))).toEqual([
      ['source.values', 'Samples', '3 numbers', '3 numbers, 2 of them others'],
    ]);
    expect(rows(tone({ table: { range: 'unipolar' } }), samples([0, 1]))).toEqual([
      ['source', 'Shape', '2 partials', '2 samples, resampled by holding each one'],
    ]);
    expect(
      rows(
        samples([0, 1]),
        tone({
          source: { kind: 'samples', values: [0, 1], resampling: 'hold' },
          level: { transfer: { gamma: 2.2 } },
          table: { range: 'unipolar' },
        }),
      ),
    ).toEqual([['level.transfer', 'Transfer curve', 'none', 'gamma 2.2']]);
  });

  test('within a mix by the part', () => {
    const mix = (gain: number, offset: number, interpolation: 'step' | 'linear') =>
      tone({
        source: {
          kind: 'mix',
          operation: 'sum',
          parts: [
            {
              gain,
              source: { kind: 'harmonics', offset, partials: [{ harmonic: 2, amplitude: 1, phaseDeg: 0 }] },
            },
            {
              gain: 1,
              source: {
                kind: 'points',
                interpolation,
                points: [
                  { x: 0, y: 0 },
                  { x: 0.5, y: 1 },
                ],
              },
            },
          ],
        },
      });
    expect(rows(mix(1, 0, 'step'), mix(0.5, 0.1, 'linear'))).toEqual([
      ['source.parts[0].gain', 'Part 1, gain', '1', '0.5'],
      ['source.parts[0].source.offset', 'Part 1: Offset', '0 of full scale', '0.1 of full scale'],
      ['source.parts[1].source.interpolation', 'Part 2: Interpolation', 'steps', 'straight lines'],
    ]);
  });

  test('of one definition alone, every one with its value', () => {
    const said = listSettings(tone({ level: { transfer: 'none' } }));
    expect(said.slice(0, 5).map(({ name, value }) => [name, value])).toEqual([
      ['Name of the wave', 'Tone'],
      ['Shape', '2 partials'],
      ['Offset', '0 of full scale'],
      ['Harmonic 1, amplitude', '1'],
      ['Harmonic 1, phase', '0°'],
    ]);
    expect(said.map(({ name }) => name)).toContain('Noise shaping');
    expect(said.filter(({ name, path }) => name === path)).toEqual([]);
  });

  test('law: nothing differs from itself; every path can be commented on; going back swaps the sides', () => {
    holds(
      fc.property(anyDefinition, anyDefinition, (one, other) => {
        const [before, after] = [parseDefinition(one), parseDefinition(other)];
        expect(changedSettings(before, structuredClone(before))).toEqual([]);
        const forth = changedSettings(before, after);
        for (const { path } of forth)
          expect(createCommentSchema.safeParse({ text: 'Why?', path }).success, path).toBe(true);
        const back = changedSettings(after, before);
        expect(new Set(back.map(({ name }) => name))).toEqual(new Set(forth.map(({ name }) => name)));
      }),
    );
  });
});
