import { readNumber } from './read-number.ts';
import { binaryFactors, siPowers, unitRule, type UnitRule } from './units.ts';

/** What a text can mean in a field of some unit. */
export type QuantityReading =
  | { kind: 'number'; value: number }
  /** Two readings are fair; nobody but the writer knows. `text` is each reading written beyond doubt. */
  | { kind: 'ask'; readings: readonly { value: number; text: string }[] }
  | { kind: 'unreadable'; why: string }
  | { kind: 'empty' };

/** A multiple that may be meant: a power of ten, or a factor for counts. */
interface Multiple {
  power: number;
  factor: number;
  shown: string;
}

const plain: Multiple = { power: 0, factor: 1, shown: '' };

/**
 * Reads a number as people type and paste it: `4.7k`, `4k7` (IEC 60062), `16 MHz`, `-3 dB`, `50 %`, `1 000`, `2e-6`.
 *
 * @param unit Unit of the field, in which the value is given back. `''` is a ratio: it takes percent, and dB as
 *   an amplitude ratio. `°` takes radians too. Words such as `bits` or `entries` are counts.
 * @returns One number; or the readings to ask about where a comma, a lower-case `m` before a misspelt unit, or a
 *   `k` before a count leaves doubt; or why it cannot be read. Range and wholeness are the caller's business.
 */
export function parseQuantity(text: string, unit = ''): QuantityReading {
  const tidy = tidied(text);
  if (tidy === '') return { kind: 'empty' };
  const rule = unitRule(unit);

  const letterAsPoint = /^([+-]?\d+)([a-zA-ZµΩ])(\d+)(.*)$/u.exec(tidy);
  if (letterAsPoint && rule.multiples === 'si') {
    const [, whole, letter, fraction, rest] = letterAsPoint;
    const isUnit = rule.names.includes(letter);
    if (
      (letter in siPowers || isUnit || letter === 'R') &&
      (rest === '' || rule.names.includes(rest.trim()))
    ) {
      return finite(Number(`${whole}.${fraction}e${isUnit || letter === 'R' ? 0 : siPowers[letter]}`));
    }
  }

  const parts = /^([+-]?)\s*([\d.,'_ ]*\d[.,]?|[.,]\d+)(?:[eE]([+-]?\d+))?\s*(.*)$/u.exec(tidy);
  if (!parts) return { kind: 'unreadable', why: 'it is not a number' };
  const [, sign, digits, exponent = '0', suffix] = parts;
  const numbers = readNumber(digits.trim());
  if (numbers.length === 0)
    return { kind: 'unreadable', why: 'its points and commas do not make one number' };

  const converted = rule.converts?.[suffix.toLowerCase()];
  const multiples = converted ? [plain] : readSuffix(suffix, rule);
  if (multiples.length === 0) return { kind: 'unreadable', why: sayUnknownUnit(suffix, rule) };

  const readings = multiples.flatMap((multiple) =>
    numbers.map((number) => {
      const value = Number(`${sign}${number}e${Number(exponent) + multiple.power}`) * multiple.factor;
      const shown = `${sign}${number}${exponent === '0' ? '' : `e${exponent}`}`;
      const tail = converted ? suffix : `${multiple.shown}${rule.names[0]}`;
      return {
        value: converted ? converted(value) : value,
        text: rule.multiples === 'counts' && multiple !== plain ? String(value) : `${shown} ${tail}`.trim(),
      };
    }),
  );
  if (readings.length === 1) return finite(readings[0].value);
  const unfit = readings.find((reading) => !Number.isFinite(reading.value));
  return unfit ? finite(unfit.value) : { kind: 'ask', readings };
}

function tidied(text: string): string {
  return text
    .trim()
    .replace(/^[\u2212\u2013\u2014]/u, '-')
    .replace(/[eE]\u2212/u, 'e-')
    .replace(/[\u00a0\u2009\u202f]/gu, ' ')
    .replace(/\u03bc/gu, 'µ')
    .replace(/^([+-])\s+/u, '$1');
}

function finite(value: number): QuantityReading {
  if (Number.isFinite(value)) return { kind: 'number', value };
  return { kind: 'unreadable', why: 'it is too large to be held' };
}

/** What may stand between the number and the end: a multiple, a unit, both or neither. */
function readSuffix(suffix: string, rule: UnitRule): Multiple[] {
  if (suffix === '' || isName(suffix, rule)) return [plain];
  if (rule.multiples === 'counts') return readCountSuffix(suffix, rule);
  if (rule.multiples === 'none') return [];

  const letter = suffix[0];
  const name = suffix.slice(1).trimStart();
  if (!(letter in siPowers)) return [];
  const multiple = (prefix: string): Multiple => ({ power: siPowers[prefix], factor: 1, shown: prefix });
  if (name === '' || rule.names.includes(name)) return [multiple(letter)];
  if (!isName(name, rule)) return [];
  // `mhz`: whoever drops the capital of the unit may have dropped that of the prefix.
  return letter === 'm' ? [multiple('M'), multiple('m')] : [multiple(letter)];
}

function readCountSuffix(suffix: string, rule: UnitRule): Multiple[] {
  const parts = /^(Ki|Mi|k|K|M)\s*(.*)$/u.exec(suffix);
  if (!parts || !(parts[2] === '' || isName(parts[2], rule))) return [];
  const binary = binaryFactors[parts[1]];
  if (binary !== undefined) return [{ power: 0, factor: binary, shown: `${parts[1]} ` }];
  // A table of "4k" entries is 4000 to some and 4096 to others.
  return [
    { power: siPowers[parts[1]], factor: 1, shown: parts[1] },
    { power: 0, factor: parts[1] === 'M' ? 2 ** 20 : 2 ** 10, shown: parts[1] },
  ];
}

function isName(text: string, rule: UnitRule): boolean {
  return rule.names.some((name) => name.toLowerCase() === text.toLowerCase());
}

function sayUnknownUnit(suffix: string, rule: UnitRule): string {
  const wanted = rule.names[0] === '' ? 'a bare number, %, or dB' : rule.names[0];
  return `“${suffix}” does not belong here; the unit is ${wanted}`;
}
