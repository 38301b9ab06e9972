/** How a unit is written, and what else may be written in its place. */
export interface UnitRule {
  /** Spellings taken; the first is the one shown. */
  readonly names: readonly string[];
  /** Which multiples may stand before it. */
  readonly multiples: 'si' | 'counts' | 'none';
  /** Other units that are converted: `value in this unit = toValue(number)`. */
  readonly converts?: Readonly<Record<string, (number: number) => number>>;
}

const degreesPerRadian = 180 / Math.PI;

const rules: Readonly<Record<string, UnitRule>> = {
  // A ratio: percent, and level as an amplitude ratio (20·log10, IEC 60027-3).
  '': {
    names: [''],
    multiples: 'si',
    converts: {
      '%': (percent) => percent / 100,
      db: (level) => 10 ** (level / 20),
      dbfs: (level) => 10 ** (level / 20),
    },
  },
  '%': { names: ['%', 'percent', 'per cent'], multiples: 'none' },
  dB: { names: ['dB'], multiples: 'none' },
  dBFS: { names: ['dBFS', 'dB'], multiples: 'none' },
  dBc: { names: ['dBc', 'dB'], multiples: 'none' },
  '°': {
    names: ['°', 'deg', 'degree', 'degrees'],
    multiples: 'none',
    converts: { rad: (angle) => angle * degreesPerRadian },
  },
  Hz: { names: ['Hz', 'hertz'], multiples: 'si' },
  s: { names: ['s', 'sec', 'second', 'seconds'], multiples: 'si' },
  V: { names: ['V', 'volt', 'volts'], multiples: 'si' },
  A: { names: ['A', 'amp', 'ampere', 'amperes'], multiples: 'si' },
  Ω: { names: ['Ω', '\u2126', 'ohm', 'ohms', 'R'], multiples: 'si' },
  F: { names: ['F', 'farad', 'farads'], multiples: 'si' },
  'V/s': { names: ['V/s'], multiples: 'si' },
  LSB: { names: ['LSB'], multiples: 'none' },
};

/** Rule of a unit; any other word is a count (`bits`, `entries`), in one or many. */
export function unitRule(unit: string): UnitRule {
  const known = rules[unit];
  if (known !== undefined) return known;
  const other = unit.endsWith('ies')
    ? `${unit.slice(0, -3)}y`
    : unit.endsWith('s')
      ? unit.slice(0, -1)
      : `${unit}s`;
  return { names: [unit, other], multiples: 'counts' };
}

/** Power of ten of each SI prefix taken. `K` is common for kilo. */
export const siPowers: Readonly<Record<string, number>> = {
  p: -12,
  n: -9,
  u: -6,
  µ: -6,
  m: -3,
  k: 3,
  K: 3,
  M: 6,
  G: 9,
};

/** Binary prefixes (IEC 80000-13), for counts. */
export const binaryFactors: Readonly<Record<string, number>> = { Ki: 2 ** 10, Mi: 2 ** 20 };
