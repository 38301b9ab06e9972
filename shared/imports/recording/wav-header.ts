import { showValue } from '../../contract/index.ts';
import { importLimits } from '../limits.ts';
import { refuseFile } from '../refuse.ts';

/** What the chunks of a RIFF WAVE file say (Microsoft, Multimedia Programming Interface 1.0, 1991; WAVEFORMATEXTENSIBLE). */
export interface WavHeader {
  readonly sampleRateHz: number;
  readonly channels: number;
  /** Bits of one sample in the file. */
  readonly sampleBits: number;
  readonly isFloat: boolean;
  /** Samples of one channel. */
  readonly length: number;
  /** Where the samples lie in the file. */
  readonly dataStart: number;
  readonly dataBytes: number;
}

const tagAt = (bytes: Uint8Array, at: number) => String.fromCharCode(...bytes.subarray(at, at + 4));

export const looksLikeWav = (bytes: Uint8Array) => /^RI|^RF/.test(tagAt(bytes, 0));

const formats = { pcm: 1, float: 3, extensible: 0xfffe } as const;
const rates = { min: 1_000, max: 768_000 };

/**
 * Goes through the chunks and holds what they claim against the size the file has. Nothing is taken out of it yet.
 *
 * @throws {Refusal} where the file is damaged, or of a kind that is not read
 */
export function readWavHeader(bytes: Uint8Array): WavHeader {
  if (bytes.length === 0) refuseFile('an empty file', 'a recording in a RIFF WAVE file');
  if (bytes.length > importLimits.fileBytes) {
    refuseFile(`${bytes.length} bytes`, `at most ${importLimits.fileBytes} bytes`);
  }
  if (bytes.length < 12 || tagAt(bytes, 0) !== 'RIFF' || tagAt(bytes, 8) !== 'WAVE') {
    refuseFile(
      `a file that begins with ${showValue(tagAt(bytes, 0))}`,
      '"RIFF" and "WAVE", as a recording has',
    );
  }
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  let format: Omit<WavHeader, 'length' | 'dataStart' | 'dataBytes'> | undefined;
  for (let at = 12; at + 8 <= bytes.length;) {
    const tag = tagAt(bytes, at);
    const size = view.getUint32(at + 4, true);
    const left = bytes.length - at - 8;
    if (size > left) {
      refuseFile(
        `a header that claims ${size} bytes in its chunk ${showValue(tag)}`,
        `the ${left} bytes that are there; a recording that was piped or cut off has to be saved anew`,
      );
    }
    if (tag === 'fmt ') format = readFormat(view, at + 8, size);
    if (tag === 'data') {
      if (!format) refuseFile('samples before their format', 'a chunk "fmt " before the chunk "data"');
      return withData(format, at + 8, size);
    }
    at += 8 + size + (size % 2);
  }
  return refuseFile(`a file without ${format ? 'samples' : 'a format'}`, 'the chunks "fmt " and "data"');
}

function readFormat(view: DataView, at: number, size: number) {
  if (size < 16) refuseFile(`a format of ${size} bytes`, 'at least 16');
  const tag = view.getUint16(at, true);
  const isExtended = tag === formats.extensible && size >= 40;
  const kind = isExtended ? view.getUint16(at + 24, true) : tag;
  const channels = view.getUint16(at + 2, true);
  const sampleRateHz = view.getUint32(at + 4, true);
  const frameBytes = view.getUint16(at + 12, true);
  const sampleBits = view.getUint16(at + 14, true);
  if (kind !== formats.pcm && kind !== formats.float) {
    refuseFile(`samples of format ${kind}`, 'plain samples (format 1) or floating point (format 3)');
  }
  const isFloat = kind === formats.float;
  const widths = isFloat ? [32, 64] : [8, 16, 24, 32];
  if (!widths.includes(sampleBits)) {
    refuseFile(`samples of ${sampleBits} bits`, `${widths.join(', ')} bits in this format`);
  }
  if (channels < 1 || channels > 64) refuseFile(`${channels} channels`, '1 to 64 channels');
  if (sampleRateHz < rates.min || sampleRateHz > rates.max) {
    refuseFile(`a sample rate of ${sampleRateHz} Hz`, `${rates.min} to ${rates.max} Hz`);
  }
  if (frameBytes !== (channels * sampleBits) / 8) {
    refuseFile(
      `${frameBytes} bytes a frame`,
      `${(channels * sampleBits) / 8}, as ${channels} channels of ${sampleBits} bits take`,
    );
  }
  return { sampleRateHz, channels, sampleBits, isFloat };
}

function withData(
  format: Omit<WavHeader, 'length' | 'dataStart' | 'dataBytes'>,
  dataStart: number,
  size: number,
): WavHeader {
  const frameBytes = (format.channels * format.sampleBits) / 8;
  const length = Math.floor(size / frameBytes);
  if (length < 2) refuseFile(`${length} samples`, 'at least 2');
  if (length > importLimits.recordingSamples) {
    refuseFile(`${length} samples a channel`, `at most ${importLimits.recordingSamples}`);
  }
  return { ...format, length, dataStart, dataBytes: length * frameBytes };
}
