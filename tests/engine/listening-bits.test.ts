import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import {
  bitsOffFigures,
  codesWithBitsOff,
  levelsOfTable,
  levelsOfVolts,
  lowestBits,
  masksOf,
  offFromBottom,
  soundWithBitsOff,
  type Sound,
} from '../../shared/listening/index.ts';

const sine: DefinitionInput['source'] = {
  kind: 'harmonics',
  partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 17 }],
};
const built = (table: DefinitionInput['table'], source: DefinitionInput['source'] = sine) =>
  buildTable({ schema: 1, name: 'Tone', source, table });
const codedOf = ({ codes, cycle, definition }: ReturnType<typeof built>) => ({
  codes,
  cycle,
  table: definition.table,
});

/** Powers of bins 1…⌊N/2⌋ by a DFT as it is written (§4), no transform shared with the engine. */
function powersOf(values: Float64Array): number[] {
  const size = values.length;
  const powers: number[] = [];
  for (let k = 1; 2 * k <= size; k += 1) {
    let re = 0;
    let im = 0;
    for (let n = 0; n < size; n += 1) {
      re += values[n] * Math.cos((2 * Math.PI * ((n * k) % size)) / size);
      im -= values[n] * Math.sin((2 * Math.PI * ((n * k) % size)) / size);
    }
    const amplitude = (Math.hypot(re, im) * (2 * k === size ? 1 : 2)) / size;
    powers.push(2 * k === size ? amplitude ** 2 : amplitude ** 2 / 2);
  }
  return powers;
}

function sinadByDefinition(values: Float64Array): number {
  const powers = powersOf(values);
  const carrier = powers.indexOf(Math.max(...powers));
  const rest = powers.reduce((sum, power, k) => (k === carrier ? sum : sum + power), 0);
  return 10 * Math.log10(powers[carrier] / rest);
}

describe('bits that are off', () => {
  test('read 0 in every code, and the others stay', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 0xffff }), fc.integer({ min: 0, max: 0xffff }), (code, off) => {
        const [left] = codesWithBitsOff(Uint16Array.of(code), off);
        for (let bit = 0; bit < 16; bit += 1) {
          const had = Math.floor(code / 2 ** bit) % 2;
          const isOff = Math.floor(off / 2 ** bit) % 2 === 1;
          expect(Math.floor(left / 2 ** bit) % 2).toBe(isOff ? 0 : had);
        }
      }),
      { seed: 20 },
    );
  });

  test('are counted from the bottom up to the first that is on', () => {
    expect([0, 1, 3, 7, 5, 6, 0xffff].map(offFromBottom)).toEqual([0, 1, 2, 3, 1, 0, 16]);
    expect(lowestBits(0)).toBe(0);
    expect(lowestBits(16)).toBe(0xffff);
  });

  test('none, each alone, and all from the bottom but the last: each mask once', () => {
    expect(masksOf(4)).toEqual([0, 1, 2, 4, 8, 3, 7]);
    expect(masksOf(1)).toEqual([0, 1]);
    for (let bits = 1; bits <= 16; bits += 1) expect(new Set(masksOf(bits)).size).toBe(masksOf(bits).length);
  });
});

describe('figures of a table that lacks bits', () => {
  test('with all bits on they are the report’s, to the last bit', () => {
    for (const table of [
      { length: 256, bits: 8 },
      { length: 1021, bits: 12, cycles: 3, range: 'unipolar' },
      { length: 360, bits: 6, scale: 'mid-tread', complement: true, dither: 'triangular', seed: 4 },
    ] as const) {
      const made = built(table);
      const { sinadDb, unwantedDb, isOtherLine } = bitsOffFigures(codedOf(made), 0);
      expect(sinadDb).toBe(made.report.sinadDb);
      expect(unwantedDb).toBe(made.report.unwantedDb);
      expect(isOtherLine).toBe(false);
    }
  });

  test('SINAD is that of the masked values, summed as it is defined', () => {
    const made = built({ length: 300, bits: 10, cycles: 7 });
    for (const off of [1, 4, 0b110100, 0b1_0000_0000, lowestBits(6)]) {
      const levels = levelsOfTable(made.definition.table);
      const values = Float64Array.from(made.codes, (code) => levels[code - (code & off)]);
      const { sinadDb } = bitsOffFigures(codedOf(made), off);
      expect(Math.abs((sinadDb ?? NaN) - sinadByDefinition(values))).toBeLessThan(1e-9);
    }
  });

  test('a sine that loses its k lowest bits keeps 6.02·(b − k) + 1.76 dB', () => {
    // What is cut off is 0 … 2^k − 1 with even chance, which with the rounding's own 1/12 is an error of 4^k/12
    // (W. R. Bennett 1948). A cycle's length prime to its crossings spreads it evenly.
    const made = built({ length: 16_381, bits: 14, cycles: 3 });
    for (let count = 0; count <= 8; count += 1) {
      const { sinadDb } = bitsOffFigures(codedOf(made), lowestBits(count));
      expect(Math.abs((sinadDb ?? NaN) - (6.02 * (14 - count) + 1.76)), `${count} off`).toBeLessThan(0.25);
    }
  });

  test('say where another line has become the strongest, and where nothing is left', () => {
    const made = built({ length: 256, bits: 8 });
    const levels = levelsOfTable(made.definition.table);
    for (const off of [...masksOf(8), 240, 252, 254]) {
      const powers = powersOf(Float64Array.from(made.codes, (code) => levels[code - (code & off)]));
      const isOther = powers[0] < Math.max(...powers);
      expect(bitsOffFigures(codedOf(made), off).isOtherLine, `without ${off}`).toBe(isOther);
    }
    // The least significant bit alone is no picture of the sine.
    expect(bitsOffFigures(codedOf(made), 254).isOtherLine).toBe(true);
    expect(bitsOffFigures(codedOf(made), 255).sinadDb).toBeNull();
  });

  test('hold by measured levels too', () => {
    const levels = Array.from({ length: 16 }, (_, code) => code + (code >= 8 ? 0.7 : 0));
    const made = built({ length: 200, bits: 4, levels });
    const { sinadDb } = bitsOffFigures(codedOf(made), 0b0011);
    const values = Float64Array.from(made.codes, (code) => levels[code & 0b1100]);
    expect(Math.abs((sinadDb ?? NaN) - sinadByDefinition(values))).toBeLessThan(1e-9);
  });
});

describe('a sound with bits off', () => {
  const made = built({ length: 64, bits: 6, range: 'unipolar' });
  const volts = Float64Array.from({ length: 64 }, (_, code) => 0.2 + 0.05 * code + 0.001 * (code % 3));
  const ladder = levelsOfVolts(volts);
  const sound: Sound = {
    drive: { kind: 'loop', sampleRateHz: 64 * 440 },
    voices: {
      ideal: { values: made.cycle.map((value) => 2 * value), cycles: 1, form: 'curve' },
      table: { values: made.values.map((value) => 2 * value), cycles: 1, form: 'staircase' },
      ladder: { values: Float64Array.from(made.codes, (code) => ladder[code]), cycles: 1, form: 'staircase' },
    },
  };
  const levels = { table: levelsOfTable(made.definition.table), ladder };

  test('is the same sound with none off, to the last bit', () => {
    expect(soundWithBitsOff(sound, made.codes, levels, 0)).toEqual(sound);
  });

  test('changes every voice that is made of codes, and no other', () => {
    const off = 0b000101;
    const { voices, drive } = soundWithBitsOff(sound, made.codes, levels, off);
    expect(drive).toBe(sound.drive);
    expect(voices.ideal).toBe(sound.voices.ideal);
    for (const [k, code] of made.codes.entries()) {
      const left = code & ~off;
      expect(voices.table.values[k]).toBe(levels.table[left]);
      expect(voices.ladder.values[k]).toBe(ladder[left]);
    }
  });

  test('voltages from lowest to highest are −1 to 1', () => {
    expect(Math.min(...ladder)).toBe(-1);
    expect(Math.max(...ladder)).toBe(1);
  });
});
