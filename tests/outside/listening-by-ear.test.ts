import { expect, test } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { bitsOffFigures, equallyLoud, masksOf, type Voice } from '../../shared/listening/index.ts';
import { askPython } from './numpy/python.ts';

// Source: numpy/by_ear.py, from the engine specification on NumPy: §4 over masked codes; RMS (Parseval) of a drawn
// staircase.

const partials = (...amplitudes: number[]) => ({
  kind: 'harmonics' as const,
  partials: amplitudes.map((amplitude, i) => ({ harmonic: i + 1, amplitude, phaseDeg: 31 * i })),
});
const definitions: DefinitionInput[] = [
  { schema: 1, name: 'Sine', source: partials(1), table: { length: 1024, bits: 12 } },
  { schema: 1, name: 'Partials', source: partials(1, 0.6, 0, 0.3), table: { length: 360, bits: 8, cycles: 3 } },
  { schema: 1, name: 'Lamp', source: partials(0.5), table: { length: 251, bits: 6, range: 'unipolar' }, level: { normalise: 'span' } },
  { schema: 1, name: 'Mid-tread', source: partials(1, 0, 0.2), table: { length: 100, bits: 10, scale: 'mid-tread', complement: true } },
]; // prettier-ignore

interface Answer {
  bits: { sinadDb: number | null; unwantedDb: number }[][];
  rms: number[];
}

test('figures without bits, and voices brought to one loudness, are those of NumPy', () => {
  const tables = definitions.map((definition) => buildTable(definition));
  const masks = tables.map(({ definition }) => [...masksOf(definition.table.bits), 0b10101]);
  const belowHz = 24_000;
  const toneHz = 311;
  const roundHz = tables.map(({ definition }) => toneHz / definition.table.cycles);
  const voices = tables.map(({ values, definition }, i): Voice => ({
    values: definition.table.range === 'unipolar' ? values.map((value) => 2 * value) : values,
    cycles: definition.table.cycles,
    form: 'staircase',
    drive: { kind: 'loop', sampleRateHz: roundHz[i] * values.length },
  }));
  const { bits, rms } = askPython<Answer>('by_ear.py', {
    bits: definitions.map((definition, i) => ({ definition, masks: masks[i] })),
    rms: voices.map(({ values }, i) => ({ values: [...values], round_hz: roundHz[i], below_hz: belowHz })),
  });

  tables.forEach(({ codes, cycle, definition: { name, table } }, i) => {
    masks[i].forEach((off, j) => {
      const { sinadDb, unwantedDb } = bitsOffFigures({ codes, cycle, table }, off);
      const wanted = bits[i][j];
      expect(Math.abs((sinadDb ?? NaN) - (wanted.sinadDb ?? NaN)), `${name} without ${off}`).toBeLessThan(
        1e-6,
      );
      expect(Math.abs((unwantedDb ?? NaN) - wanted.unwantedDb), `${name} without ${off}`).toBeLessThan(1e-6);
    });
  });

  for (let i = 1; i < voices.length; i += 1) {
    const [a, b] = [voices[0], voices[i]];
    const matched = equallyLoud(a, b, { kind: 'loop', sampleRateHz: 48_000 }, 2 * belowHz);
    if (matched.kind !== 'matched') throw new Error('not matched');
    const levels = [rms[0] * (matched.a.gain ?? NaN), rms[i] * (matched.b.gain ?? NaN)];
    expect(Math.abs(20 * Math.log10(levels[0] / levels[1])), definitions[i].name).toBeLessThan(0.001);
    expect(Math.max(...levels)).toBeLessThanOrEqual(Math.min(rms[0], rms[i]) * 1.000_001);
  }
});
