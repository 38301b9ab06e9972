import * as wavefile from 'wavefile';
import { Refusal } from '../../contract/index.ts';
import { refuseFile } from '../refuse.ts';
import { readWavHeader, type WavHeader } from './wav-header.ts';

/** One channel of a recording. */
export interface Recording {
  /** −1…1; floating-point files may go beyond. */
  readonly samples: Float64Array;
  readonly sampleRateHz: number;
  readonly header: WavHeader;
}

// Node sees the package as a CommonJS module without named exports, Vite as an ES module with them.
const seen: { WaveFile?: typeof wavefile.WaveFile; default?: typeof wavefile } = { ...wavefile };
const WaveFile = seen.WaveFile ?? seen.default?.WaveFile;

/**
 * Reads one channel of a RIFF WAVE file: 8 to 32 bits, or floating point. The package sees a file that we have made
 * anew of the format and the samples alone: what other chunks claim cannot reach it.
 *
 * @param channel from 0
 * @throws {Refusal} where the file is damaged, of another kind, or holds samples that are no numbers
 */
export function readWav(bytes: Uint8Array, channel = 0): Recording {
  const header = readWavHeader(bytes);
  if (!Number.isInteger(channel) || channel < 0 || channel >= header.channels) {
    throw new Refusal({ path: 'channel', value: String(channel + 1), allowed: `1 to ${header.channels}` });
  }
  if (!WaveFile) throw new Error('The package wavefile has no WaveFile.');
  const file = new WaveFile(plainFile(bytes, header));
  const interleaved = file.getSamples(true, Float64Array);
  const samples = new Float64Array(header.length);
  const { channels, sampleBits, isFloat } = header;
  const scale = isFloat ? 1 : 2 ** (1 - sampleBits);
  // Eight bits alone are stored without a sign.
  const middle = !isFloat && sampleBits === 8 ? 128 : 0;
  for (let i = 0; i < samples.length; i += 1) {
    const value = (interleaved[i * channels + channel] - middle) * scale;
    if (!Number.isFinite(value))
      refuseFile(`${value} in sample ${i + 1} of channel ${channel + 1}`, 'finite numbers');
    samples[i] = value;
  }
  return { samples, sampleRateHz: header.sampleRateHz, header };
}

function plainFile(bytes: Uint8Array, header: WavHeader): Uint8Array {
  const { channels, sampleRateHz, sampleBits, isFloat, dataStart, dataBytes } = header;
  const file = new Uint8Array(44 + dataBytes);
  const view = new DataView(file.buffer);
  const tag = (at: number, text: string) => {
    for (let i = 0; i < 4; i += 1) file[at + i] = text.charCodeAt(i);
  };
  const frameBytes = (channels * sampleBits) / 8;
  tag(0, 'RIFF');
  view.setUint32(4, 36 + dataBytes, true);
  tag(8, 'WAVE');
  tag(12, 'fmt ');
  view.setUint32(16, 16, true);
  view.setUint16(20, isFloat ? 3 : 1, true);
  view.setUint16(22, channels, true);
  view.setUint32(24, sampleRateHz, true);
  view.setUint32(28, sampleRateHz * frameBytes, true);
  view.setUint16(32, frameBytes, true);
  view.setUint16(34, sampleBits, true);
  tag(36, 'data');
  view.setUint32(40, dataBytes, true);
  file.set(bytes.subarray(dataStart, dataStart + dataBytes), 44);
  return file;
}
