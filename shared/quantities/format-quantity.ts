import { unitRule } from './units.ts';

const prefixes: readonly (readonly [number, string])[] = [
  [9, 'G'],
  [6, 'M'],
  [3, 'k'],
  [0, ''],
  [-3, 'm'],
  [-6, 'µ'],
  [-9, 'n'],
  [-12, 'p'],
];

const minus = '\u2212';
const hardSpace = '\u00a0';

export interface FormatOptions {
  /** Significant digits, 1…15; 4 unless told. Trailing zeros are dropped. */
  significant?: number;
  /** Digits after the point, kept even where they are zeros; takes the place of `significant`. */
  decimals?: number;
}

/**
 * A quantity for reading: `formatQuantity(16e6, 'Hz')` → `16 MHz`, `formatQuantity(-3.5, 'dB', { decimals: 2 })` →
 * `−3.50 dB`. Units of measure take the SI prefix that leaves 1…999; ratios and counts take none. The minus is the
 * sign of mathematics and the space does not break. A figure that does not exist (`null`) is a dash.
 */
export function formatQuantity(value: number | null, unit = '', options: FormatOptions = {}): string {
  if (value === null || Number.isNaN(value)) return '–';
  if (!Number.isFinite(value)) return value > 0 ? '∞' : `${minus}∞`;
  const takesPrefix = unit !== '' && unitRule(unit).multiples === 'si';
  const [power, prefix] = takesPrefix ? prefixFor(value, options.significant ?? 4) : ([0, ''] as const);
  const number = formatNumber(value / 10 ** power, options);
  if (unit === '') return number;
  return unit === '°' ? `${number}°` : `${number}${hardSpace}${prefix}${unit}`;
}

function prefixFor(value: number, significant: number): readonly [number, string] {
  // Rounded first, so that 999.96 k with four digits becomes 1 M and not 1000 k.
  const rounded = Math.abs(Number(value.toPrecision(significant)));
  if (rounded === 0) return [0, ''];
  return prefixes.find(([power]) => rounded >= 10 ** power) ?? prefixes[prefixes.length - 1];
}

function formatNumber(value: number, { significant = 4, decimals }: FormatOptions): string {
  const text =
    decimals === undefined ? String(Number(value.toPrecision(significant))) : value.toFixed(decimals);
  const isZero = Number(text) === 0;
  return isZero ? text.replace('-', '') : text.replace(/-/gu, minus);
}

/**
 * A quantity for a field to edit: reads back through `parseQuantity` to the same double. Large or small values of a
 * unit take an SI prefix where that is short and loses nothing: `16M`, `4.7k`, `440`.
 */
export function quantityText(value: number, unit = ''): string {
  const whole = String(value);
  const takesPrefix = unit !== '' && unitRule(unit).multiples === 'si';
  if (!takesPrefix || value === 0 || !Number.isFinite(value)) return whole;
  const size = Math.abs(value);
  if (size >= 0.1 && size < 10_000) return whole;
  for (const [power, prefix] of prefixes) {
    if (size < 10 ** power) continue;
    const mantissa = String(Number((value / 10 ** power).toPrecision(12)));
    const isShort = mantissa.replace(/[-.]/gu, '').length <= 6;
    return isShort && Number(`${mantissa}e${power}`) === value ? `${mantissa}${prefix}` : whole;
  }
  return whole;
}
