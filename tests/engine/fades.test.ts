import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { Refusal } from '../../shared/contract/index.ts';
import { fade, lightnessOf, pulseTrain, type FadeOptions } from '../../shared/fades/index.ts';
import { waveOf } from './support/waves.ts';

function tableOf(options: FadeOptions, bits = 16) {
  const { source, level } = fade(options);
  return buildTable(waveOf({ source, level, table: { length: options.length, bits, range: 'unipolar' } }));
}
const lengths = [2, 3, 64, 255, 256, 4096, 10_000];

describe('a fade', () => {
  it.each(lengths)('once through %i entries begins at one end and ends at the other', (length) => {
    for (const shape of ['linear', 'perceptual', 'exponential'] as const) {
      const darkest = shape === 'exponential' ? 1 / 250 : 0;
      const up = tableOf({ shape, way: 'up', ratio: 250, length }).cycle;
      const down = tableOf({ shape, way: 'down', ratio: 250, length }).cycle;
      expect([up[0], up[length - 1]]).toEqual([expect.closeTo(darkest, 15), expect.closeTo(1, 15)]);
      const off = down.findIndex((value, k) => Math.abs(value - up[length - 1 - k]) > 1e-6);
      expect(off).toBe(-1);
      expect(up.every((value, k) => k === 0 || value > up[k - 1])).toBe(true);
    }
  });

  it.each(lengths.filter((length) => length > 3))(
    'there and back in %i entries begins dark and is the same both ways',
    (length) => {
      for (const shape of ['linear', 'perceptual', 'exponential'] as const) {
        const { cycle } = tableOf({ shape, way: 'there-and-back', length });
        expect(cycle[0]).toBeCloseTo(shape === 'exponential' ? 0.01 : 0, 14);
        if (length % 2 === 0) expect(cycle[length / 2]).toBeCloseTo(1, 14);
        // The two branches of lightness are 4·10⁻⁸ apart at L* 8, where the last bit chooses.
        const off = cycle.findIndex((value, k) => k > 0 && Math.abs(value - cycle[length - k]) > 1e-7);
        expect(off).toBe(-1);
      }
    },
  );

  it.each([64, 1000, 4096, 10_000, 65_536])('exponential has equal ratios, %i entries', (length) => {
    for (const way of ['up', 'there-and-back'] as const) {
      const { cycle, codes } = tableOf({ shape: 'exponential', way, ratio: 1000, length });
      let most = 0;
      let codesOff = 0;
      cycle.forEach((value, k) => {
        const u = way === 'up' ? k / (length - 1) : 1 - Math.abs(1 - (2 * k) / length);
        const wanted = 1000 ** (u - 1);
        most = Math.max(most, (value - wanted) / wanted, (wanted - value) / 1e6);
        codesOff = Math.max(codesOff, Math.abs(codes[k] - wanted * 65_535));
      });
      const bound = length <= 4096 ? 1e-12 : (Math.log(1000) / (way === 'up' ? 4095 : 2048)) ** 2 / 8;
      expect(most).toBeLessThanOrEqual(bound + 1e-12);
      expect(codesOff).toBeLessThan(0.6);
    }
  });

  it('perceptual has equal steps of lightness', () => {
    const length = 512;
    const { cycle } = tableOf({ shape: 'perceptual', way: 'up', length });
    cycle.forEach((luminance, k) => {
      expect(lightnessOf(luminance)).toBeCloseTo((100 * k) / (length - 1), 9);
    });
  });

  it.each([
    [{ length: 1 }, 'table.length'],
    [{ length: 65_537 }, 'table.length'],
    [{ ratio: 1 }, 'ratio'],
    [{ ratio: NaN }, 'ratio'],
  ])('is refused for %o', (change, path) => {
    const options: FadeOptions = { shape: 'exponential', way: 'up', length: 64, ...change };
    expect(() => fade(options)).toThrow(Refusal);
    expect(() => fade(options)).toThrow(new RegExp(`^${path}: `));
  });
});

describe('the pulses of an envelope', () => {
  const codes = Uint16Array.of(0, 1, 128, 255);
  const clockHz = 16_000_000;

  it('fast ones begin with their period and last (code + 1)/2^b of it', () => {
    const pwm = { bits: 8, mode: 'fast' as const, prescaler: 1 };
    const { periodS, duties, risesS, fallsS } = pulseTrain(codes, { pwm, clockHz, periodsPerEntry: 3 });
    expect(periodS).toBe(256 / clockHz);
    expect(Array.from(duties)).toEqual([1, 2, 129, 256].flatMap((high) => Array(3).fill(high / 256)));
    risesS.forEach((rise, period) => {
      expect(rise).toBeCloseTo(period * periodS, 15);
      expect(fallsS[period] - rise).toBeCloseTo(duties[period] * periodS, 15);
    });
  });

  it('phase-correct ones lie in the middle and last code/(2^b − 1)', () => {
    const pwm = { bits: 8, mode: 'phase-correct' as const, prescaler: 8 };
    const { periodS, duties, risesS, fallsS } = pulseTrain(codes, { pwm, clockHz, periodsPerEntry: 1 });
    expect(periodS).toBeCloseTo((2 * 8 * 255) / clockHz, 15);
    expect(Array.from(duties)).toEqual([0, 1 / 255, 128 / 255, 1]);
    duties.forEach((_, period) => {
      expect((risesS[period] + fallsS[period]) / 2).toBeCloseTo((period + 0.5) * periodS, 15);
    });
  });

  it('carry the mean of the envelope', () => {
    const { codes: envelope } = tableOf({ shape: 'perceptual', way: 'there-and-back', length: 200 }, 10);
    const pwm = { bits: 10, mode: 'phase-correct' as const, prescaler: 1 };
    const { periodS, risesS, fallsS } = pulseTrain(envelope, { pwm, clockHz, periodsPerEntry: 4 });
    const high = fallsS.reduce((sum, fall, period) => sum + fall - risesS[period], 0);
    const mean = envelope.reduce((sum, code) => sum + code / 1023, 0) / 200;
    expect(high / (800 * periodS)).toBeCloseTo(mean, 10);
  });

  it('are refused where there are too many, or a code is too wide', () => {
    const pwm = { bits: 7, mode: 'fast' as const, prescaler: 1 };
    const pulses = (periodsPerEntry: number) => () => pulseTrain(codes, { pwm, clockHz, periodsPerEntry });
    expect(pulses(1)).toThrow(/^codes\[2\]: 128 is not allowed; allowed: codes up to 127/);
    for (const count of [0, 1.5, 2 ** 22 + 1]) expect(pulses(count)).toThrow(/^periodsPerEntry: /);
  });
});
