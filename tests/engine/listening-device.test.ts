import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import { readResponseCsv } from '../../shared/imports/index.ts';
import { convolve } from '../../shared/listening/convolve.ts';
import {
  curveProblems,
  deviceKinds,
  gainOf,
  levelAt,
  minimumPhaseImpulse,
  type ResponsePoint,
} from '../../shared/listening/index.ts';
import { holds, noise } from './support/seeded.ts';

const dB = (ratio: number) => 20 * Math.log10(ratio);

/** Curves of 60 dB from 20…60 Hz to 15 kHz and beyond, a third of an octave between points at least. */
const curves = fc
  .record({
    firstHz: fc.double({ min: 20, max: 60, noNaN: true }),
    top: fc.double({ min: -20, max: 100, noNaN: true }),
    steps: fc.array(
      fc.record({
        octaves: fc.double({ min: 0.33, max: 2, noNaN: true }),
        slope: fc.double({ min: -24, max: 24, noNaN: true }),
      }),
      { minLength: 30, maxLength: 30 },
    ),
  })
  .map(({ firstHz, top, steps }) => {
    const points: ResponsePoint[] = [{ hz: firstHz, db: top - 30 }];
    for (const { octaves, slope } of steps) {
      const before = points[points.length - 1];
      if (before.hz > 15_000) break;
      const db = Math.min(top, Math.max(top - 60, before.db + slope * octaves));
      points.push({ hz: before.hz * 2 ** octaves, db });
    }
    return points;
  });

function gainOfImpulse(impulse: Float32Array, hz: number, rateHz: number): number {
  let re = 0;
  let im = 0;
  for (let n = 0; n < impulse.length; n += 1) {
    re += impulse[n] * Math.cos((2 * Math.PI * hz * n) / rateHz);
    im -= impulse[n] * Math.sin((2 * Math.PI * hz * n) / rateHz);
  }
  return Math.hypot(re, im);
}

function worstError(points: readonly ResponsePoint[], rateHz: number): number {
  const impulse = minimumPhaseImpulse(points, rateHz);
  const gain = gainOf(points);
  let worst = 0;
  for (let step = 0; step <= 60; step += 1) {
    const hz = 50 * 400 ** (step / 60);
    if (hz >= 0.49 * rateHz) break;
    worst = Math.max(worst, Math.abs(dB(gainOfImpulse(impulse, hz, rateHz) / gain(hz))));
  }
  return worst;
}

describe('response curves', () => {
  it('are straight over the logarithm of frequency, and level beyond their ends', () => {
    const points = [
      { hz: 100, db: -12 },
      { hz: 400, db: 0 },
      { hz: 4_000, db: -20 },
    ];
    expect(levelAt(points, 200)).toBeCloseTo(-6, 12);
    expect(levelAt(points, 400)).toBe(0);
    expect(levelAt(points, Math.sqrt(400 * 4_000))).toBeCloseTo(-10, 12);
    expect([0, 1, 100].map((hz) => levelAt(points, hz))).toEqual([-12, -12, -12]);
    expect([4_000, 9e4].map((hz) => levelAt(points, hz))).toEqual([-20, -20]);
  });

  it('are never louder than straight, and reach it at their strongest point', () => {
    holds(
      fc.property(curves, fc.double({ min: 0, max: 1e5, noNaN: true }), (points, hz) => {
        const gain = gainOf(points);
        expect(gain(hz)).toBeLessThanOrEqual(1 + 1e-12);
        expect(Math.max(...points.map((point) => gain(point.hz)))).toBeCloseTo(1, 12);
      }),
    );
  });

  it('the three to begin with have no problems', () => {
    for (const { points } of deviceKinds) expect(curveProblems(points)).toEqual([]);
  });

  it('tell what is wrong by point', () => {
    const say = (points: readonly ResponsePoint[]) => curveProblems(points).map(({ path }) => path);
    expect(say([{ hz: 100, db: 0 }])).toEqual(['points']);
    expect(say(Array.from({ length: 257 }, (_, k) => ({ hz: 100 + k, db: 0 })))).toEqual(['points']);
    expect(
      say([
        { hz: 0.5, db: 0 },
        { hz: 300, db: 161 },
        { hz: 300, db: NaN },
        { hz: 200_001, db: -120 },
      ]),
    ).toEqual(['points[0].hz', 'points[1].db', 'points[2].hz', 'points[2].db', 'points[3].hz']);
  });
});

describe('the minimum-phase impulse response', () => {
  it('has a curve of up to 24 dB an octave within 0.25 dB, 50 Hz to 20 kHz', () => {
    holds(
      fc.property(curves, fc.constantFrom(44_100, 48_000), (points, rateHz) => {
        expect(worstError(points, rateHz)).toBeLessThan(0.25);
      }),
      12,
    );
  });

  it('has the three curves within 0.15 dB at every common rate', () => {
    for (const { points } of deviceKinds)
      for (const rateHz of [8_000, 44_100, 96_000]) expect(worstError(points, rateHz)).toBeLessThan(0.15);
  });

  it('is of minimum phase: no response of its magnitude has more of its energy at the beginning', () => {
    const rateHz = 48_000;
    const impulse = minimumPhaseImpulse(deviceKinds[1].points, rateHz);
    // A zero turned from inside the unit circle to its outside leaves the magnitude: (z⁻¹ − a)/(1 − a·z⁻¹).
    for (const a of [0.5, -0.7, 0.95]) {
      let energy = 0;
      let others = 0;
      let [x1, y1] = [0, 0];
      for (let n = 0; n < 2_000; n += 1) {
        const y = x1 - a * impulse[n] + a * y1;
        [x1, y1] = [impulse[n], y];
        energy += impulse[n] ** 2;
        others += y ** 2;
        expect(energy).toBeGreaterThanOrEqual(others * (1 - 1e-6));
      }
    }
  });

  it('convolves as the sum says', () => {
    holds(
      fc.property(fc.integer({ min: 1, max: 700 }), fc.integer({ min: 1, max: 200 }), (length, taps) => {
        const x = Float32Array.from(noise(length, length));
        const h = Float32Array.from(noise(taps, taps + 1));
        convolve(x, h).forEach((y, n) => {
          let sum = 0;
          for (let k = 0; k < Math.min(taps, n + 1); k += 1) sum += h[k] * x[n - k];
          expect(Math.abs(y - sum)).toBeLessThan(1e-5);
        });
      }),
      25,
    );
  });
});

describe('curves as text', () => {
  const points = (text: string, reading = {}) => {
    const outcome = readResponseCsv(text, reading);
    return outcome.kind === 'read' ? outcome.points.map(({ hz, db }) => [hz, db]) : outcome.question;
  };

  it('have two columns, with or without heading and units', () => {
    const wanted = [
      [300, -3],
      [3_400, -6.5],
    ];
    for (const text of [
      '300,-3\n3400,-6.5\n',
      'Hz;dB\r\n300;-3\r\n3400;-6.5\r\n',
      'f in kHz\tlevel in dB\n0.3\t\u22123\n3.4\t\u22126.5',
      '300 Hz, -3 dB\n3400 Hz, -6.5 dB',
      '0.3 kHz  -3 dB\n3.4 kHz  -6.5 dB',
      'dB,Hz\n-3,300\n\n-6.5,3400\n',
    ]) {
      expect(points(text), text).toEqual(wanted);
    }
    // There must be two columns, so that the comma between whole numbers parts them.
    expect(points('300,3\n3400,6\n')).toEqual([
      [300, 3],
      [3_400, 6],
    ]);
  });

  it('ask what a lone comma means, and take either answer', () => {
    const text = 'Hz;dB\n300;-3,5\n3400;-6,25\n';
    const question = points(text);
    if (Array.isArray(question)) throw new Error('It was not asked.');
    expect(question.cell).toBe('-3,5');
    expect(question.answers.map(({ reading }) => reading.decimal)).toEqual(['comma', 'point']);
    expect(points(text, question.answers[0].reading)).toEqual([
      [300, -3.5],
      [3_400, -6.25],
    ]);
  });

  it('are refused by line and column', () => {
    const refusals: readonly [string, string][] = [
      ['', 'file: an empty text'],
      ['300\n3400\n', 'file: 1 column'],
      ['300,-3,1\n3400,-3,1\n', 'file: 3 columns'],
      ['300,-3\n3400,x\n', 'line 2, column 6: "x"'],
      ['300,-3\n\n200,0\n', 'line 3, column 1: 200'],
      ['Hz,dB\n300,-3\n3400, 161\n', 'line 3, column 7: 161'],
      ['0.5;-3\n3400;0\n', 'line 1, column 1: 0.5'],
      ['300 Hz;-3\n3.4 kHz;0\n', 'line 2, column 5: "kHz"'],
      ['300 mHz;-3\n400 mHz;0\n', 'line 1, column 1: "300 mHz"'],
      ['300;-3\n400;0\n500;\n', 'line 3, column 5: an empty cell'],
      ['300;-3\n"400;0\n', 'line 2, column 2: a quote'],
    ];
    for (const [text, said] of refusals) {
      expect(() => readResponseCsv(text), text).toThrow(Refusal);
      expect(() => readResponseCsv(text), text).toThrow(said);
    }
  });
});
