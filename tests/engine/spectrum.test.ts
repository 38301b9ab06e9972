import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { dbfsOf } from '../../shared/analysis/index.ts';
import { linesOf, phasesDegOf } from '../../shared/dft/index.ts';
import { anyDefinition } from './support/definitions.ts';
import { examplesOf, holds, noise } from './support/seeded.ts';
import { valuesOf, waveOf } from './support/waves.ts';

describe('spectra', () => {
  it('hold the power of what the codes stand for, of the cycle and of the error (Parseval)', () => {
    let seen = 0;
    for (const definition of examplesOf(anyDefinition, 150)) {
      if (definition.table?.fold !== undefined) continue;
      const { cycle, values, spectrum } = buildTable(definition);
      const error = values.map((q, k) => q - cycle[k]);
      for (const [amplitudes, signal] of [
        [spectrum.amplitudes, values],
        [spectrum.intended, cycle],
        [spectrum.added, error],
      ] as const) {
        const power = amplitudes.reduce(
          (sum, a, k) => sum + (k === 0 || 2 * k === signal.length ? a * a : (a * a) / 2),
          0,
        );
        const meanSquare = signal.reduce((sum, x) => sum + x * x, 0) / signal.length;
        expect(Math.abs(power - meanSquare)).toBeLessThanOrEqual(1e-11 * meanSquare + 1e-24);
        seen += 1;
      }
    }
    expect(seen).toBeGreaterThan(300);
  });

  it('an amplitude-1 sine is 0 dBFS in its own bin, in its own phase', () => {
    holds(
      fc.property(
        fc.integer({ min: 5, max: 2000 }),
        fc.nat(),
        fc.integer({ min: -179, max: 180 }),
        (length, pick, phaseDeg) => {
          const harmonic = 1 + (pick % (Math.ceil(length / 2) - 1));
          const source = { kind: 'harmonics' as const, partials: [{ harmonic, amplitude: 1, phaseDeg }] };
          const { spectrum, values } = buildTable(
            waveOf({ source, level: { normalise: 'none' }, table: { length, bits: 16 } }),
          );
          expect(dbfsOf(spectrum.intended[harmonic])).toBeCloseTo(0, 9);
          expect(dbfsOf(spectrum.amplitudes[harmonic])).toBeCloseTo(0, 2);
          const apart = Math.abs(phasesDegOf(linesOf(values))[harmonic] - phaseDeg);
          expect(Math.min(apart, 360 - apart)).toBeLessThan(0.1);
        },
      ),
    );
  });

  it('mean and Nyquist line are not doubled', () => {
    const mean = buildTable(valuesOf(new Array(8).fill(1))).spectrum.amplitudes;
    expect(mean[0]).toBeCloseTo(1, 14);
    const nyquist = buildTable(valuesOf([1, -1, 1, -1, 1, -1])).spectrum.amplitudes;
    expect(Array.from(nyquist, (a) => Math.round(a * 1e12) / 1e12)).toEqual([0, 0, 0, 1]);
  });

  it('what is added stays exact beside a signal 90 dB stronger', () => {
    const cycle = noise(4096, 3);
    const { spectrum, cycle: r, values } = buildTable(valuesOf(cycle, { bits: 16 }));
    const k = 1234;
    let re = 0;
    let im = 0;
    for (let n = 0; n < 4096; n += 1) {
      const angle = (-2 * Math.PI * ((n * k) % 4096)) / 4096;
      re += (values[n] - r[n]) * Math.cos(angle);
      im += (values[n] - r[n]) * Math.sin(angle);
    }
    expect(spectrum.added[k] / ((2 * Math.hypot(re, im)) / 4096)).toBeCloseTo(1, 9);
  });

  it('what was intended stays exact under an error far stronger than itself', () => {
    const source = {
      kind: 'harmonics' as const,
      partials: [{ harmonic: 5, amplitude: 1e-14, phaseDeg: 40 }],
    };
    const { spectrum, report } = buildTable(
      waveOf({ source, level: { normalise: 'none' }, table: { length: 300, shaping: 1 } }),
    );
    expect(spectrum.intended[5] / 1e-14).toBeCloseTo(1, 9);
    const strongest = Math.max(...spectrum.added.slice(1));
    expect(report.unwantedDb).toBeCloseTo(20 * Math.log10(strongest / 1e-14), 6);
  });

  it('levels end at a floor of −200 dB', () => {
    expect([1, 0.5, 1e-10, 1e-11, 0].map(dbfsOf)).toEqual([0, 20 * Math.log10(0.5), -200, -200, -200]);
  });
});
