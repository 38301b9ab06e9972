import type { TableSettings } from '../contract/index.ts';
import { snapSteps } from './scaling.ts';

/** Measured voltages of a converter in order of voltage; of equal ones, the lowest code first. */
interface VoltageScale {
  readonly volts: Float64Array;
  readonly codes: Uint16Array;
  readonly lowest: number;
  readonly span: number;
  /** 2⁻²⁴ of the mean step `(Vmax − Vmin)/(L − 1)`: distances are compared in whole multiples of it. */
  readonly grain: number;
}

function voltageScale(levels: readonly number[]): VoltageScale {
  const order = Uint32Array.from(levels, (_, code) => code);
  order.sort((a, b) => levels[a] - levels[b] || a - b);
  const lowest = levels[order[0]];
  const span = levels[order[order.length - 1]] - lowest;
  return {
    volts: Float64Array.from(order, (code) => levels[code]),
    codes: Uint16Array.from(order),
    lowest,
    span,
    grain: span / (levels.length - 1) / snapSteps,
  };
}

/**
 * For each sample the code whose measured voltage is nearest to the wanted one (§3.4); a tie goes to the
 * higher voltage, then to the lower code. Codes need not be in order of voltage.
 */
export function nearestLevels(
  cycle: Float64Array,
  levels: readonly number[],
  range: TableSettings['range'],
): Uint16Array {
  const scale = voltageScale(levels);
  const { volts } = scale;
  return Uint16Array.from(cycle, (x) => {
    const share = range === 'bipolar' ? (x + 1) / 2 : x;
    const wanted = scale.lowest + share * scale.span;
    const distance = (index: number) => Math.round(Math.abs(volts[index] - wanted) / scale.grain);

    const above = firstAtLeast(volts, wanted);
    let best = Math.min(above, volts.length - 1);
    if (above > 0 && distance(above - 1) < distance(best)) best = above - 1;
    // Voltages closer together than the grain tie; the highest of them is taken, and its lowest code.
    while (best + 1 < volts.length && distance(best + 1) === distance(best)) best += 1;
    while (best > 0 && volts[best - 1] === volts[best]) best -= 1;
    return scale.codes[best];
  });
}

/** Index of the first voltage that is not below `wanted`; the length where there is none. */
function firstAtLeast(volts: Float64Array, wanted: number): number {
  let low = 0;
  let high = volts.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (volts[middle] < wanted) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Values q of codes: the measured voltages mapped back to signal units by the same line (§3.5). */
export function valuesOfLevels(
  codes: Uint16Array,
  levels: readonly number[],
  range: TableSettings['range'],
): Float64Array {
  const { lowest, span } = voltageScale(levels);
  return Float64Array.from(codes, (code) => {
    const share = (levels[code] - lowest) / span;
    return range === 'bipolar' ? 2 * share - 1 : share;
  });
}
