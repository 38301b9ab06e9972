/**
 * A RIFF WAVE file of one channel of linear PCM (Multimedia Programming Interface and Data Specifications 1.0, 1991):
 * codes in the upper bits of 8-bit unsigned samples, or of 16-bit signed ones above 8 bits, the lower bits 0.
 *
 * @param codes 0…2^bits − 1
 * @param repeats how often the codes follow each other, from 1
 * @returns the file; its size stays below 4 GiB for all that a table can hold
 */
export function wavFile(
  codes: Uint16Array,
  { bits, sampleRateHz, repeats }: { bits: number; sampleRateHz: number; repeats: number },
): Uint8Array {
  const sampleBytes = bits <= 8 ? 1 : 2;
  const dataBytes = codes.length * repeats * sampleBytes;
  // Chunks are of even length: an odd one has a byte behind it that its size does not count.
  const file = new Uint8Array(44 + dataBytes + (dataBytes % 2));
  const view = new DataView(file.buffer);
  const ascii = (at: number, text: string) =>
    Array.from(text).forEach((letter, k) => view.setUint8(at + k, letter.charCodeAt(0)));
  ascii(0, 'RIFF');
  view.setUint32(4, file.length - 8, true);
  ascii(8, 'WAVEfmt ');
  view.setUint32(16, 16, true);
  view.setUint16(20, 1, true);
  view.setUint16(22, 1, true);
  view.setUint32(24, sampleRateHz, true);
  view.setUint32(28, sampleRateHz * sampleBytes, true);
  view.setUint16(32, sampleBytes, true);
  view.setUint16(34, 8 * sampleBytes, true);
  ascii(36, 'data');
  view.setUint32(40, dataBytes, true);
  for (let k = 0; k < codes.length; k += 1) {
    if (sampleBytes === 1) view.setUint8(44 + k, codes[k] << (8 - bits));
    else view.setInt16(44 + 2 * k, (codes[k] - 2 ** (bits - 1)) << (16 - bits), true);
  }
  const once = file.subarray(44, 44 + codes.length * sampleBytes);
  for (let turn = 1; turn < repeats; turn += 1) file.set(once, 44 + turn * once.length);
  return file;
}
