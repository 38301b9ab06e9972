import type { Drawing } from '../../../shared/contract/index.ts';

const columns = 64;

/** Low and high of each of at most 64 columns of codes, interleaved, as shares 0…255 of full scale. */
export function drawingOf(codes: Uint16Array, bits: number): Uint8Array {
  const count = Math.min(columns, codes.length);
  const share = 255 / (2 ** bits - 1);
  const drawing = new Uint8Array(2 * count);
  for (let column = 0; column < count; column += 1) {
    const from = Math.floor((column * codes.length) / count);
    const to = Math.floor(((column + 1) * codes.length) / count);
    let low = codes[from];
    let high = low;
    for (let k = from; k < to; k += 1) {
      low = Math.min(low, codes[k]);
      high = Math.max(high, codes[k]);
    }
    drawing[2 * column] = Math.round(low * share);
    drawing[2 * column + 1] = Math.round(high * share);
  }
  return drawing;
}

export function presentDrawing(stored: Uint8Array): Drawing {
  const low: number[] = [];
  const high: number[] = [];
  for (let k = 0; k < stored.length; k += 2) {
    low.push(stored[k]);
    high.push(stored[k + 1]);
  }
  return { low, high };
}
