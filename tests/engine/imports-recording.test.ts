import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import {
  cutCycle,
  findPeriod,
  proposeBounds,
  readWav,
  readWavHeader,
  snapBounds,
} from '../../shared/imports/index.ts';
import { examplesOf, holds, noise } from './support/seeded.ts';
import { toneOf, wavOf } from './support/recordings.ts';

function refusalOf(work: () => unknown): string {
  try {
    work();
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
  throw new Error('nothing was refused');
}

describe('a recording in a RIFF WAVE file', () => {
  const formats = [
    { bits: 8, isFloat: false },
    { bits: 16, isFloat: false },
    { bits: 24, isFloat: false },
    { bits: 32, isFloat: false },
    { bits: 32, isFloat: true },
    { bits: 64, isFloat: true },
  ] as const;

  it.each(formats)('comes back sample by sample: %j', ({ bits, isFloat }) => {
    holds(
      fc.property(
        fc.array(fc.integer({ min: -(2 ** 31), max: 2 ** 31 - 1 }), {
          minLength: 4,
          maxLength: 60,
        }),
        fc.integer({ min: 1, max: 3 }),
        (whole, channels) => {
          const length = Math.floor(whole.length / channels);
          fc.pre(length >= 2);
          // Such as the format holds to the last bit.
          const values = whole.map(
            (value) => Math.floor(value / 2 ** Math.max(0, 32 - bits)) / 2 ** (Math.min(bits, 32) - 1),
          );
          const file = wavOf(values.slice(0, length * channels), {
            bits,
            isFloat,
            channels,
            sampleRateHz: 8000,
          });
          for (let channel = 0; channel < channels; channel += 1) {
            const { samples, sampleRateHz } = readWav(file, channel);
            expect(sampleRateHz).toBe(8000);
            const wanted = Array.from({ length }, (_, i) => values[i * channels + channel]);
            expect(Array.from(samples)).toEqual(bits === 32 && isFloat ? wanted.map(Math.fround) : wanted);
          }
        },
      ),
      30,
    );
  });

  const sound = () =>
    wavOf([0, 0.5, -0.5, 0.25], { bits: 16, isFloat: false, channels: 1, sampleRateHz: 8000 });
  const changed = (change: (view: DataView) => void) => {
    const file = sound();
    change(new DataView(file.buffer));
    return file;
  };

  it.each([
    ['an empty file', () => new Uint8Array(0), 'file: an empty file'],
    [
      'no recording',
      () => new TextEncoder().encode('hello, all of you'),
      'file: a file that begins with "hell"',
    ],
    [
      'one cut off',
      () => sound().slice(0, 48),
      'a header that claims 8 bytes in its chunk "data" is not allowed; allowed: the 4',
    ],
    [
      '300 MB claimed',
      () => changed((v) => v.setUint32(40, 300e6, true)),
      'a header that claims 300000000 bytes',
    ],
    [
      'a format that is cut off',
      () => sound().slice(0, 30),
      'a header that claims 16 bytes in its chunk "fmt "',
    ],
    ['no samples', () => sound().slice(0, 36), 'file: a file without samples'],
    ['compressed samples', () => changed((v) => v.setUint16(20, 6, true)), 'samples of format 6'],
    ['no channels', () => changed((v) => v.setUint16(22, 0, true)), '0 channels'],
    ['a sample rate of 0', () => changed((v) => v.setUint32(24, 0, true)), 'a sample rate of 0 Hz'],
    ['odd bits', () => changed((v) => v.setUint16(34, 17, true)), 'samples of 17 bits'],
    [
      'frames that do not fit',
      () => changed((v) => v.setUint16(32, 4, true)),
      '4 bytes a frame is not allowed; allowed: 2',
    ],
    ['one sample', () => changed((v) => v.setUint32(40, 2, true)), '1 samples'],
    [
      'numbers that are none',
      () => wavOf([0, NaN, 1], { bits: 32, isFloat: true, channels: 1, sampleRateHz: 8000 }),
      'NaN in sample 2 of channel 1',
    ],
  ])('is refused: %s', (_, file, message) => {
    expect(refusalOf(() => readWav(file()))).toContain(message);
  });

  it('is refused on a channel that it does not have', () => {
    expect(refusalOf(() => readWav(sound(), 1))).toBe('channel: 2 is not allowed; allowed: 1 to 1');
  });

  it('is known by its header alone', () => {
    expect(readWavHeader(sound())).toMatchObject({
      sampleRateHz: 8000,
      channels: 1,
      sampleBits: 16,
      length: 4,
    });
  });
});

describe('the period of a tone', () => {
  /** Harmonics of any strength and phase under noise; the pitch anywhere up to a tenth of the rate. */
  const recording = fc.record({
    sampleRateHz: fc.constantFrom(16_000, 22_050, 44_100, 48_000),
    place: fc.double({ min: 0, max: 1, noNaN: true }),
    partials: fc.array(
      fc.tuple(fc.double({ min: 0.3, max: 1.3, noNaN: true }), fc.double({ min: 0, max: 360, noNaN: true })),
      { minLength: 1, maxLength: 12 },
    ),
    noiseDb: fc.double({ min: -40, max: -15, noNaN: true }),
    seconds: fc.double({ min: 0.3, max: 1.2, noNaN: true }),
  });

  it('is found within 1 cent in 100 recordings of known pitch under noise', () => {
    examplesOf(recording, 100).forEach(({ sampleRateHz, place, partials, noiseDb, seconds }, index) => {
      const frequencyHz = 60 * (sampleRateHz / 600) ** place;
      const samples = toneOf({ frequencyHz, sampleRateHz, seconds, partials });
      const power = samples.reduce((sum, x) => sum + x * x, 0) / samples.length;
      // Uniform noise from −a to a has the power a²/3.
      const amplitude = Math.sqrt(3 * power) * 10 ** (noiseDb / 20);
      const hiss = noise(samples.length, index + 1);
      const found = findPeriod(
        samples.map((x, i) => x + amplitude * hiss[i]),
        sampleRateHz,
      );
      expect(
        Math.abs(1200 * Math.log2(found.frequencyHz / frequencyHz)),
        JSON.stringify({ index, frequencyHz }),
      ).toBeLessThan(1);
      expect(found.clarity).toBeGreaterThan(0.9);
    });
  });

  it('is not found in noise, in silence, nor in less than two of it', () => {
    expect(refusalOf(() => findPeriod(noise(20_000), 48_000))).toContain('a signal in which nothing repeats');
    expect(refusalOf(() => findPeriod(new Float64Array(20_000), 48_000))).toContain('nothing repeats');
    expect(refusalOf(() => findPeriod(new Float64Array(10), 48_000))).toContain('10 samples');
  });
});

describe('one cycle cut out', () => {
  const tone = (frequencyHz: number) =>
    toneOf({
      frequencyHz,
      sampleRateHz: 48_000,
      seconds: 0.3,
      partials: [
        [1, 0],
        [0.5, 40],
        [0.25, 80],
      ],
    });

  it('begins and ends on rising zero crossings, one period apart', () => {
    holds(
      fc.property(fc.double({ min: 80, max: 1500, noNaN: true }), (frequencyHz) => {
        const samples = tone(frequencyHz);
        const period = 48_000 / frequencyHz;
        const { startSample, endSample } = proposeBounds(samples, period);
        expect(Math.abs(endSample - startSample - period)).toBeLessThan(Math.max(0.05, period / 1000));
        for (const at of [startSample, endSample]) {
          expect(samples[Math.floor(at)]).toBeLessThanOrEqual(1e-9);
          expect(samples[Math.floor(at) + 1]).toBeGreaterThan(-1e-9);
        }
        expect(snapBounds(samples, { startSample, endSample }).startSample).toBeCloseTo(startSample, 1);
      }),
      30,
    );
  });

  it('is the tone itself: a whole number of harmonics, as strong as they were', () => {
    holds(
      fc.property(
        fc.double({ min: 80, max: 1500, noNaN: true }),
        fc.constantFrom(64, 256, 1024),
        (frequencyHz, length) => {
          const samples = tone(frequencyHz);
          const period = 48_000 / frequencyHz;
          const bounds = { startSample: 4000.25, endSample: 4000.25 + period };
          const start = (360 * 4000.25) / period;
          for (const join of [{ kind: 'none' }, { kind: 'crossfade', share: 0.1 }] as const) {
            const { values, seam } = cutCycle(samples, bounds, length, join);
            const wanted = values.map((_, k) =>
              [1, 0.25, 0.25 / 3].reduce(
                (sum, a, i) =>
                  sum + a * Math.sin(((i + 1) * (start + (360 * k) / length) + 40 * i) * (Math.PI / 180)),
                0,
              ),
            );
            expect(values.every((value, k) => Math.abs(value - wanted[k]) < 2e-3)).toBe(true);
            expect(Math.abs(seam.step)).toBeLessThanOrEqual(seam.largestWithin * 1.05 + 1e-3);
          }
          const { source } = cutCycle(samples, bounds, length, { kind: 'harmonics', highest: 3 });
          if (source.kind !== 'harmonics') throw new Error('no harmonics');
          expect(source.partials.map(({ harmonic }) => harmonic)).toEqual([1, 2, 3]);
          source.partials.forEach(({ amplitude }, i) =>
            expect(Math.abs(amplitude - [1, 0.25, 0.25 / 3][i])).toBeLessThan(0.01),
          );
        },
      ),
      30,
    );
  });

  it('closes where its bounds do not fit: a fade and harmonics take the step out of the seam', () => {
    const samples = tone(220);
    const bounds = { startSample: 5000, endSample: 5000 + (48_000 / 220) * 1.07 };
    const open = cutCycle(samples, bounds, 256, { kind: 'none' });
    expect(Math.abs(open.seam.step)).toBeGreaterThan(3 * open.seam.largestWithin);
    for (const join of [
      { kind: 'crossfade', share: 0.1 },
      { kind: 'harmonics', highest: 20 },
    ] as const) {
      const { seam } = cutCycle(samples, bounds, 256, join);
      expect(Math.abs(seam.step)).toBeLessThan(1.01 * seam.largestWithin);
    }
  });

  it.each([
    [{ startSample: -1, endSample: 10 }, { kind: 'none' }, 'startSample: -1'],
    [{ startSample: 5, endSample: 6 }, { kind: 'none' }, 'endSample: 6'],
    [{ startSample: 5, endSample: 1e6 }, { kind: 'none' }, 'endSample: 1000000'],
    [{ startSample: NaN, endSample: 10 }, { kind: 'none' }, 'startSample: NaN'],
    [{ startSample: 5, endSample: 500 }, { kind: 'crossfade', share: 0.1 }, 'join.share: 0.1'],
    [{ startSample: 500, endSample: 900 }, { kind: 'crossfade', share: 2 }, 'join.share: 2'],
    [{ startSample: 5, endSample: 500 }, { kind: 'harmonics', highest: 3 }, 'startSample: 5'],
    [{ startSample: 500, endSample: 900 }, { kind: 'harmonics', highest: 128 }, 'join.highest: 128'],
  ] as const)('is refused where it does not fit: %j %j', (bounds, join, message) => {
    expect(refusalOf(() => cutCycle(tone(220), bounds, 256, join))).toContain(message);
  });
});
