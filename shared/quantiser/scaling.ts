import type { TableSettings } from '../contract/index.ts';

type Scaling = Pick<TableSettings, 'bits' | 'range' | 'scale'>;

/** Levels of b bits, L = 2^b. */
export function levelsOf(bits: number): number {
  return 2 ** bits;
}

/** The straight line of §3.2 from a signal x to a code position: `v = gain·x + offset`. */
export function positionLine({ bits, range, scale }: Scaling): { gain: number; offset: number } {
  const top = levelsOf(bits) - 1;
  if (range === 'unipolar') return { gain: top, offset: 0 };
  if (scale === 'mid-tread') return { gain: (top + 1) / 2, offset: (top + 1) / 2 };
  return { gain: top / 2, offset: top / 2 };
}

/** One LSB in signal units (§3.5). */
export function lsbOf(scaling: Scaling): number {
  return 1 / positionLine(scaling).gain;
}

/** Code positions are rounded to this share of an LSB, so that a tie is a tie on every machine. */
export const snapSteps = 2 ** 24;

/** The line to whole multiples of 2⁻²⁴, half a step added: `position = floor(x·gain + offset)/2²⁴` is snapped. */
export function snappedLine(scaling: Scaling): { gain: number; offset: number } {
  const { gain, offset } = positionLine(scaling);
  return { gain: gain * snapSteps, offset: offset * snapSteps + 0.5 };
}

/** Code positions v of a cycle (§3.2), snapped. */
export function positionsOf(cycle: Float64Array, scaling: Scaling): Float64Array {
  const { gain, offset } = snappedLine(scaling);
  const positions = new Float64Array(cycle.length);
  for (let k = 0; k < cycle.length; k += 1) positions[k] = Math.floor(cycle[k] * gain + offset) / snapSteps;
  return positions;
}

/** The line of §3.5 from a code to its value: `(multiplier·c − less)/divisor − minus`, exact in every step but one. */
export function valueLine({ bits, range, scale }: Scaling): {
  multiplier: number;
  less: number;
  divisor: number;
  minus: number;
} {
  const levels = levelsOf(bits);
  if (range === 'unipolar') return { multiplier: 1, less: 0, divisor: levels - 1, minus: 0 };
  if (scale === 'mid-tread') return { multiplier: 1, less: levels / 2, divisor: levels / 2, minus: 0 };
  return { multiplier: 2, less: 0, divisor: levels - 1, minus: 1 };
}

/** Values q of codes in signal units (§3.5), for tables without measured levels. */
export function valuesOfCodes(codes: Uint16Array, scaling: Scaling): Float64Array {
  const { multiplier, less, divisor, minus } = valueLine(scaling);
  const values = new Float64Array(codes.length);
  for (let k = 0; k < codes.length; k += 1) values[k] = (multiplier * codes[k] - less) / divisor - minus;
  return values;
}
