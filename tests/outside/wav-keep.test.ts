import { readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import {
  deviceKinds,
  minimumPhaseImpulse,
  renderSound,
  wholeRounds,
  type ResponsePoint,
} from '../../shared/listening/index.ts';
import { wavFile } from '../../shared/listening/wav-file.ts';
import { fullScaleCode, type WavDepth } from '../../shared/listening/wav-scale.ts';
import { noise } from '../engine/support/seeded.ts';
import { askPython } from './numpy/python.ts';
import { inFolder, run } from './support/programs.ts';

const depths: readonly WavDepth[] = ['8', '16', '24', '32f'];

/** What ±1 is in a file, as another program reads it. */
const readersScale = (depth: WavDepth) => (depth === '32f' ? 1 : 2 ** (Number(depth) - 1));

/** Frames within full scale, both ends of it among them; an odd number, so that 8 and 24 bits need a byte of filling. */
const frames = Float32Array.from(noise(4_801));
frames.set([1, -1, 0]);

// Source: SoX itself (its reader of RIFF WAVE; Multimedia Programming Interface and Data Specifications 1.0, 1991).
describe('SoX reads a kept sound', () => {
  const soxi = async (folder: string, flag: string) =>
    Number(await run('sox', ['--i', flag, 'kept.wav'], folder));

  it.each(depths)('of depth %s: header, every sample, RMS and peak', async (depth) => {
    const said = await inFolder([], async (folder) => {
      await writeFile(join(folder, 'kept.wav'), wavFile(frames, { rateHz: 44_100, depth, ditherSeed: null }));
      const raw =
        depth === '32f' ? ['-e', 'floating-point', '-b', '64'] : ['-e', 'signed-integer', '-b', depth];
      await run('sox', ['-V2', '-D', 'kept.wav', '-t', 'raw', ...raw, '-L', 'kept.raw'], folder);
      return {
        rate: await soxi(folder, '-r'),
        samples: await soxi(folder, '-s'),
        bits: await soxi(folder, '-b'),
        channels: await soxi(folder, '-c'),
        encoding: (await run('sox', ['--i', '-e', 'kept.wav'], folder)).trim(),
        stat: await run('sh', ['-c', 'sox kept.wav -n stat 2>&1'], folder),
        raw: await readFile(join(folder, 'kept.raw')),
      };
    });
    const encodings = { '8': 'Unsigned Integer PCM', '32f': 'Floating Point PCM' } as Record<
      WavDepth,
      string
    >;
    expect(said).toMatchObject({
      rate: 44_100,
      samples: frames.length,
      bits: depth === '32f' ? 32 : Number(depth),
      channels: 1,
      encoding: encodings[depth] ?? 'Signed Integer PCM',
    });

    const scale = fullScaleCode(depth, false);
    const codeAt = (i: number) => {
      if (depth === '32f') return said.raw.readDoubleLE(8 * i);
      const bytes = Number(depth) / 8;
      return said.raw.readIntLE(bytes * i, bytes);
    };
    let worst = 0;
    for (let i = 0; i < frames.length; i += 1)
      worst = Math.max(worst, Math.abs(codeAt(i) - frames[i] * scale));
    // SoX holds floating-point samples in 32 bits, the largest of them one short of 1.
    expect(worst).toBeLessThanOrEqual(depth === '32f' ? 2 ** -30 : 0.5);

    const figure = (name: string) => Number(new RegExp(`${name}: +(-?[\\d.]+)`).exec(said.stat)?.[1]);
    const rms = Math.sqrt(frames.reduce((sum, value) => sum + value * value, 0) / frames.length);
    const share = scale / readersScale(depth);
    // Printed with six decimals; the rounding of 8 bits adds a little.
    expect(Math.abs(figure('RMS     amplitude') - rms * share)).toBeLessThan(depth === '8' ? 2e-5 : 2e-6);
    expect(Math.abs(figure('Maximum amplitude') - share)).toBeLessThan(1e-6);
    expect(Math.abs(figure('Minimum amplitude') + share)).toBeLessThan(1e-6);
  });

  it('with dither as noise of a quarter of a squared code more, and no mean', async () => {
    // Triangular dither, then rounding: variances 1/6 + 1/12 (R. A. Wannamaker and others, 2000; from memory).
    const quiet = Float32Array.from(noise(60_001, 5), (value) => value / 100);
    const stat = await inFolder([], async (folder) => {
      const scale = fullScaleCode('16', true);
      const exact = Float32Array.from(quiet, (value) => (value * scale) / 2 ** 15);
      await writeFile(
        join(folder, 'dithered.wav'),
        wavFile(quiet, { rateHz: 48_000, depth: '16', ditherSeed: 1 }),
      );
      await writeFile(
        join(folder, 'exact.wav'),
        wavFile(exact, { rateHz: 48_000, depth: '32f', ditherSeed: null }),
      );
      // The difference, louder, so that one code is 0.05.
      const mix = `sox -D -m -v 1 dithered.wav -v -1 exact.wav -n vol ${0.05 * 2 ** 15} stat 2>&1`;
      return run('sh', ['-c', mix], folder);
    });
    const figure = (name: string) => Number(new RegExp(`${name}: +(-?[\\d.]+)`).exec(stat)?.[1]) / 0.05;
    expect(figure('RMS     amplitude')).toBeGreaterThan(0.5 * 0.99);
    expect(figure('RMS     amplitude')).toBeLessThan(0.5 * 1.01);
    expect(Math.abs(figure('Mean    amplitude'))).toBeLessThan(0.01);
    expect(figure('Maximum amplitude')).toBeLessThanOrEqual(1.51);
  });
});

interface KeptLines {
  rate: number;
  frames: number;
  kind: string;
  lines: number;
  worstDb: number;
  highestHz: number;
}

/** A wave with lines everywhere: a sawtooth of 5 bits in 100 entries. */
const values = Float64Array.from({ length: 100 }, (_, k) => Math.round((k / 99) * 31) / 15.5 - 1);

async function keptLines(
  tones: readonly {
    toneHz: number;
    depth: WavDepth;
    curve: readonly ResponsePoint[] | null;
    downToDb: number;
  }[],
): Promise<KeptLines[]> {
  const rateHz = 48_000;
  return inFolder([], async (folder) => {
    const cases = await Promise.all(
      tones.map(async ({ toneHz, depth, curve, downToDb }, index) => {
        const { frames: count, rounds, roundHz } = wholeRounds(toneHz, rateHz, 1);
        const sound = renderSound({
          voice: { values, cycles: 1, form: 'staircase', gain: 0.8 },
          drive: { kind: 'loop', sampleRateHz: roundHz * values.length },
          rateHz,
          frames: count,
          impulse: curve && minimumPhaseImpulse(curve, rateHz),
          isFaded: false,
        });
        const path = join(folder, `${index}.wav`);
        await writeFile(path, wavFile(sound, { rateHz, depth, ditherSeed: depth === '16' ? 1 : null }));
        return {
          path,
          // SciPy reads 24 bits into the upper part of 32.
          fullScale: fullScaleCode(depth, depth === '16') * (depth === '24' ? 256 : 1),
          middle: 0,
          values: Array.from(values, (value) => value * 0.8),
          rounds,
          upToHz: 20_000,
          downToDb,
          curve: curve && curve.map(({ hz, db }) => [hz, db]),
        };
      }),
    );
    return askPython<KeptLines[]>('kept_wav.py', cases);
  });
}

// Source: NumPy's own sums over the held entries, engine specification §5, of files as SciPy reads them.
describe('NumPy finds in a kept sound', () => {
  it('the staircase’s lines to 20 kHz within 0.05 dB, images included, at 48 kHz', async () => {
    const found = await keptLines([
      { toneHz: 437.123, depth: '32f', curve: null, downToDb: -90 },
      { toneHz: 58.27, depth: '24', curve: null, downToDb: -90 },
      { toneHz: 437.123, depth: '16', curve: null, downToDb: -60 },
    ]);
    for (const { lines, worstDb, highestHz } of found) {
      expect(worstDb).toBeLessThan(0.05);
      expect(highestHz).toBeGreaterThan(19_000);
      expect(lines).toBeGreaterThan(40);
    }
    expect(found.map(({ kind }) => kind)).toEqual(['float32', 'int32', 'int16']);
    // Of 58 Hz the sample rate is 5.8 kHz: two thirds of the lines are images.
    expect(found[1].lines).toBeGreaterThan(300);
  });

  it('each device’s curve within 0.25 dB', async () => {
    const found = await keptLines(
      deviceKinds.map(({ points }) => ({ toneHz: 437.123, depth: '32f', curve: points, downToDb: -100 })),
    );
    for (const { worstDb, lines } of found) {
      expect(worstDb).toBeLessThan(0.25);
      expect(lines).toBeGreaterThan(40);
    }
  });
});
