import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import {
  heardLines,
  PinPlayer,
  roundOnGrid,
  RoundReader,
  staircaseLines,
  stepKernel,
  type Drive,
  type Voice,
} from '../../shared/listening/index.ts';
import type { StageParts } from '../../shared/output-stage/index.ts';
import { analyseAccumulator } from '../../shared/playback/index.ts';
import { examplesOf, noise } from '../engine/support/seeded.ts';
import { waveOf } from '../engine/support/waves.ts';
import { askPython } from './numpy/python.ts';
import { commitSeed } from './numpy/seed.ts';

const rateHz = 48_000;

interface Played {
  /** Lines above −80 dBFS up to 20 kHz, and how far the worst of them is off. */
  readonly lines: number;
  readonly worstDb: number;
  /** The strongest of what is there besides. */
  readonly spuriousDb: number;
}

const stages: (StageParts | undefined)[] = [
  undefined,
  {
    outputOhms: 10_000,
    capacitanceF: 330e-12,
    opAmp: { slewRateVPerS: 1e6, gainBandwidthHz: 1e6 },
    filter: { kind: 'rc', cutoffHz: 9000 },
  },
  {
    outputOhms: 10_000,
    capacitanceF: 330e-12,
    opAmp: { slewRateVPerS: 1e6, gainBandwidthHz: 1e6 },
    filter: { kind: 'butterworth', cutoffHz: 5000 },
  },
];

const askedStage = (stage: StageParts | undefined) =>
  stage?.opAmp === undefined || stage.filter.kind === 'none'
    ? null
    : {
        ohms: stage.outputOhms,
        farads: stage.capacitanceF,
        gainBandwidthHz: stage.opAmp.gainBandwidthHz,
        ...stage.filter,
      };

/** One second, after all that begins has died away. */
function secondOf(player: PinPlayer | RoundReader): Float64Array {
  const frames = new Float64Array(rateHz / 10 + rateHz);
  player.process(frames, 0, frames.length);
  return frames.slice(rateHz / 10);
}

function pinPlaying({ values, stage }: Voice, drive: Drive): PinPlayer {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const player = new PinPlayer(rateHz);
  player.load({ values: values.map((value) => value - mean), drive, kernel: stepKernel(rateHz, stage) });
  return player;
}

function roundPlaying(voice: Voice, roundHz: number): RoundReader {
  const reader = new RoundReader(rateHz);
  const drive: Drive = { kind: 'loop', sampleRateHz: roundHz * voice.values.length };
  reader.load({ ...roundOnGrid(heardLines(voice, drive, rateHz)), roundHz });
  return reader;
}

// Source: numpy/listening.py, written from §5 of the engine specification.
describe('NumPy', () => {
  it('finds the lines of 40 staircases as we do, by their treads and by steps 256 times as fine', () => {
    const cases = examplesOf(fc.tuple(fc.integer({ min: 2, max: 200 }), fc.nat()), 40, commitSeed()).map(
      ([length, start]) => ({ values: noise(length, start), count: 3 * length }),
    );
    const wanted = askPython<{ treads: [number, number][]; fine: number[] }[]>(
      'listening.py',
      cases.map(({ values, count }) => ({ kind: 'staircase', values: Array.from(values), count })),
    );
    cases.forEach(({ values, count }, i) => {
      const { re, im } = staircaseLines(values, count);
      for (let m = 1; m <= count; m += 1) {
        const [theirRe, theirIm] = wanted[i].treads[m - 1];
        expect(Math.hypot(re[m] - theirRe, im[m] - theirIm)).toBeLessThan(1e-12);
        const amplitude = Math.hypot(re[m], im[m]);
        if (amplitude < 1e-9) continue;
        expect(Math.abs(20 * Math.log10(amplitude / wanted[i].fine[m - 1]))).toBeLessThan(0.05);
      }
    });
  });

  it('hears 24 loops as we predict them: within 0.05 dB to 20 kHz, images included, nothing else above −90 dBFS', () => {
    const cases = examplesOf(
      fc.record({
        length: fc.oneof(fc.integer({ min: 3, max: 64 }), fc.integer({ min: 65, max: 700 })),
        roundHz: fc.oneof(fc.integer({ min: 31, max: 500 }), fc.integer({ min: 501, max: 5000 })),
        start: fc.nat(),
        stage: fc.nat({ max: 2 }),
        isPin: fc.boolean(),
      }),
      24,
      commitSeed(),
    );
    const answers = askPython<Played[]>(
      'listening.py',
      cases.map(({ length, roundHz, start, stage, isPin }) => {
        const voice: Voice = {
          values: noise(length, start),
          cycles: 1,
          form: 'staircase',
          ...(stages[stage] && { stage: stages[stage] }),
        };
        const player = isPin
          ? pinPlaying(voice, { kind: 'loop', sampleRateHz: roundHz * length })
          : roundPlaying(voice, roundHz);
        const frames = Array.from(secondOf(player));
        return {
          kind: 'loop',
          values: Array.from(voice.values),
          roundHz,
          frames,
          stage: askedStage(voice.stage),
        };
      }),
    );
    answers.forEach(({ lines, worstDb, spuriousDb }, i) => {
      const what = JSON.stringify(cases[i]);
      expect(lines, what).toBeGreaterThan(0);
      expect(worstDb, what).toBeLessThan(0.05);
      expect(spuriousDb, what).toBeLessThan(-90);
    });
  });

  it('runs 10 accumulators and hears their spurs as they are played and as the closed form has them', () => {
    const cases = examplesOf(
      fc.record({
        indexBits: fc.integer({ min: 3, max: 10 }),
        toneHz: fc.integer({ min: 100, max: 1500 }),
        bits: fc.integer({ min: 6, max: 14 }),
      }),
      10,
      commitSeed(),
    ).map((each, i) => ({
      ...each,
      // A power of two of hertz, so that a round of so many samples is a second. Spurs are measured where nothing
      // follows the pin, and all of them lie below 20 kHz.
      rateBits: i < 5 ? 15 - 2 * (i % 2) : 15 + (i % 3),
      stage: i < 5 ? 0 : i % 3,
    }));
    const asked = cases.map(({ rateBits, indexBits, toneHz, bits, stage }) => {
      const { values } = buildTable(waveOf({ table: { length: 2 ** indexBits, bits, startPhaseDeg: 17 } }));
      const accumulator = { accumulatorBits: 40, stepWord: (toneHz | 1) * 2 ** (40 - rateBits) };
      const sampleRateHz = 2 ** rateBits;
      const voice: Voice = {
        values,
        cycles: 1,
        form: 'staircase',
        ...(stages[stage] && { stage: stages[stage] }),
      };
      const figures = analyseAccumulator(values, accumulator);
      const hzOf = (bin: number | null) => (Number(bin) * sampleRateHz) / figures.period;
      const isMeasured = rateBits <= 15 && stage === 0;
      return {
        figures,
        isMeasured,
        question: {
          kind: 'accumulator',
          values: Array.from(values),
          sampleRateHz,
          ...accumulator,
          frames: Array.from(
            secondOf(pinPlaying(voice, { kind: 'accumulator', sampleRateHz, ...accumulator })),
          ),
          stage: askedStage(voice.stage),
          ...(isMeasured && {
            carrierHz: hzOf(figures.carrierBin),
            spurHz: hzOf(figures.worstTruncationBin),
          }),
        },
      };
    });
    const answers = askPython<(Played & { measuredDbc?: number; computedDbc?: number })[]>(
      'listening.py',
      asked.map(({ question }) => question),
    );
    answers.forEach(({ lines, worstDb, spuriousDb, measuredDbc, computedDbc }, i) => {
      const what = JSON.stringify(cases[i]);
      expect(lines, what).toBeGreaterThan(0);
      expect(worstDb, what).toBeLessThan(0.05);
      expect(spuriousDb, what).toBeLessThan(-90);
      if (!asked[i].isMeasured) return;
      const { worstTruncationDbc } = asked[i].figures;
      expect(computedDbc, what).toBeCloseTo(Number(worstTruncationDbc), 3);
      expect(Math.abs(Number(measuredDbc) - Number(worstTruncationDbc)), what).toBeLessThan(0.5);
    });
    expect(asked.filter(({ isMeasured }) => isMeasured).length).toBeGreaterThanOrEqual(5);
  });
});
