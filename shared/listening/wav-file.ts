import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import * as wavefile from 'wavefile';
import { fullScaleCode, type WavDepth } from './wav-scale.ts';

export interface WavOrder {
  /** Frames a second: a whole number. */
  readonly rateHz: number;
  readonly depth: WavDepth;
  /** Seed of triangular dither, for whole-number samples; null for none. */
  readonly ditherSeed: number | null;
}

// Node sees the package as a CommonJS module without named exports, Vite as an ES module with them.
const seen: { WaveFile?: typeof wavefile.WaveFile; default?: typeof wavefile } = { ...wavefile };
const WaveFile = seen.WaveFile ?? seen.default?.WaveFile;

/**
 * Frames as a RIFF WAVE file of one channel, rounded to the nearest code, with triangular dither of ±1 code first where
 * it is asked for (xoroshiro128+, 32 bits a draw: one seed, one file). The package writes the file; its samples are
 * packed here, as it takes a microsecond for each.
 *
 * @param frames full scale ±1
 * @throws {RangeError} where a frame is beyond ±1 and the samples are whole numbers: nothing is ever clipped
 */
export function wavFile(
  frames: Float32Array,
  { rateHz, depth, ditherSeed }: WavOrder,
): Uint8Array<ArrayBuffer> {
  if (!WaveFile) throw new Error('The package wavefile has no WaveFile.');
  const wav = new WaveFile();
  wav.fromScratch(1, rateHz, depth, []);
  const samples = depth === '32f' ? packedFloats(frames) : packedCodes(frames, depth, ditherSeed);
  Object.assign(wav.data, { samples });
  const file = wav.toBuffer();
  if (samples.length % 2 === 0) return new Uint8Array(file);
  // Chunks are of even length: an odd one has a byte behind it that its own size does not count.
  const padded = new Uint8Array(file.length + 1);
  padded.set(file);
  new DataView(padded.buffer).setUint32(4, padded.length - 8, true);
  return padded;
}

function packedFloats(frames: Float32Array): Uint8Array {
  const view = new DataView(new ArrayBuffer(4 * frames.length));
  for (let i = 0; i < frames.length; i += 1) view.setFloat32(4 * i, frames[i], true);
  return new Uint8Array(view.buffer);
}

function packedCodes(
  frames: Float32Array,
  depth: Exclude<WavDepth, '32f'>,
  ditherSeed: number | null,
): Uint8Array {
  const bytes = Number(depth) / 8;
  const scale = fullScaleCode(depth, ditherSeed !== null);
  const generator = xoroshiro128plus(ditherSeed ?? 0);
  const draw = () => ((generator.next() >>> 0) + 0.5) / 2 ** 32 - 0.5;
  const packed = new Uint8Array(bytes * frames.length);
  for (let i = 0; i < frames.length; i += 1) {
    const frame = frames[i];
    if (!(frame >= -1 && frame <= 1)) throw new RangeError(`Frame ${i} is ${frame}: beyond full scale.`);
    const dither = ditherSeed === null ? 0 : draw() + draw();
    const code = Math.round(frame * scale + dither);
    // Eight bits alone are stored without a sign.
    if (bytes === 1) packed[i] = code + 128;
    else for (let byte = 0; byte < bytes; byte += 1) packed[bytes * i + byte] = code >> (8 * byte);
  }
  return packed;
}
