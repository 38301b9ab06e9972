import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatQuantity, parseQuantity, quantityText } from '../../shared/quantities/index.ts';

const read = (text: string, unit = '') => parseQuantity(text, unit);
const number = (value: number) => ({ kind: 'number', value });

describe('a number as it is typed or pasted', () => {
  it.each([
    ['12', '', 12],
    ['-0.5', '', -0.5],
    ['\u22120.5', '', -0.5],
    ['- 3', '', -3],
    ['+.25', '', 0.25],
    ['5.', '', 5],
    ['1e3', '', 1000],
    ['2.5E-3', '', 0.0025],
    ['4.7k', '', 4700],
    ['50 %', '', 0.5],
    ['50 %', '%', 50],
    ['-3 dB', 'dB', -3],
    ['-20 dB', '', 0.1],
    ['0 dBFS', '', 1],
    ['-3 dB', 'dBFS', -3],
    ['16 MHz', 'Hz', 16e6],
    ['16MHz', 'Hz', 16e6],
    ['16 M', 'Hz', 16e6],
    ['44.1 khz', 'Hz', 44_100],
    ['3 mHz', 'Hz', 0.003],
    ['440', 'Hz', 440],
    ['4.7k', 'Ω', 4700],
    ['4k7', 'Ω', 4700],
    ['4k7 Ω', 'Ω', 4700],
    ['4R7', 'Ω', 4.7],
    ['10 kohm', 'Ω', 10_000],
    ['10 k\u2126', 'Ω', 10_000],
    ['3V3', 'V', 3.3],
    ['100 nF', 'F', 1e-7],
    ['2µ2', 'F', 2.2e-6],
    ['2\u03bc2', 'F', 2.2e-6],
    ['90°', '°', 90],
    ['90 deg', '°', 90],
    ['1 bit', 'bits', 1],
    ['8 bits', 'bits', 8],
    ['1 entry', 'entries', 1],
    ['4 Ki', 'entries', 4096],
    ['64 Ki entries', 'entries', 65_536],
    ['16 000', 'entries', 16_000],
    ['16\u2009000', 'entries', 16_000],
    ["16'000", 'entries', 16_000],
    ['1,234,567', '', 1_234_567],
    ['1.234.567', '', 1_234_567],
    ['1,234.5', '', 1234.5],
    ['1.234,5', '', 1234.5],
    ['1 234.5', '', 1234.5],
    ['0,5', '', 0.5],
  ])('%j in %j is %d', (text, unit, value) => {
    expect(read(text, unit)).toEqual(number(value));
  });

  it('takes radians where degrees are wanted', () => {
    expect(read('3.141592653589793 rad', '°')).toEqual(number(180));
  });

  it('shifts the decimal point instead of multiplying, so that 1.1k is 1100 exactly', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 99_999 }), (tenths) => {
        expect(read(`${tenths / 10}k`, 'Hz')).toEqual(number(tenths * 100));
      }),
      { seed: 2, numRuns: 500 },
    );
  });
});

describe('a text with two fair readings is asked about', () => {
  it.each([
    ['4,7k', 'Ω', [4700, 47_000], ['4.7 kΩ', '47 kΩ']],
    ['1,000', '', [1, 1000], ['1.000', '1000']],
    ['16 mhz', 'Hz', [16e6, 0.016], ['16 MHz', '16 mHz']],
    ['4k', 'entries', [4000, 4096], ['4000', '4096']],
    ['-12,5', '', [-12.5, -125], ['-12.5', '-125']],
  ])('%j in %j', (text, unit, values, texts) => {
    const reading = read(text, unit);
    expect(reading.kind).toBe('ask');
    if (reading.kind !== 'ask') return;
    expect(reading.readings.map((each) => each.value)).toEqual(values);
    expect(reading.readings.map((each) => each.text)).toEqual(texts);
  });

  it('offers texts that are read beyond doubt', () => {
    const reading = read('4,7k', 'Ω');
    if (reading.kind !== 'ask') throw new Error('nothing was asked');
    for (const { value, text } of reading.readings) expect(read(text, 'Ω')).toEqual(number(value));
  });
});

describe('a text that cannot be read says why', () => {
  it.each([
    ['abc', '', 'it is not a number'],
    ['NaN', '', 'it is not a number'],
    ['Infinity', '', 'it is not a number'],
    ['--3', '', 'it is not a number'],
    ['1e999', '', 'it is too large to be held'],
    ['1.2.3', '', 'its points and commas do not make one number'],
    ['1,2,3', '', 'its points and commas do not make one number'],
    ['1 2', '', 'its points and commas do not make one number'],
    ['16 MHz', 'V', '“MHz” does not belong here; the unit is V'],
    ['3 V', '', '“V” does not belong here; the unit is a bare number, %, or dB'],
    ['4k', 'dB', '“k” does not belong here; the unit is dB'],
  ])('%j in %j', (text, unit, why) => {
    expect(read(text, unit)).toEqual({ kind: 'unreadable', why });
  });

  it('tells an empty field from a wrong one', () => {
    expect(read('  ')).toEqual({ kind: 'empty' });
  });
});

describe('a quantity for reading', () => {
  it.each([
    [16e6, 'Hz', {}, '16\u00a0MHz'],
    [999_960, 'Hz', {}, '1\u00a0MHz'],
    [0.0047, 'A', {}, '4.7\u00a0mA'],
    [0, 'V', {}, '0\u00a0V'],
    [-3.5, 'dB', { decimals: 2 }, '\u22123.50\u00a0dB'],
    [-0.001, 'dB', { decimals: 2 }, '0.00\u00a0dB'],
    [90, '°', {}, '90°'],
    [0.123456, '', {}, '0.1235'],
    [65_536, 'entries', { significant: 6 }, '65536\u00a0entries'],
    [null, 'dB', {}, '–'],
    [-Infinity, 'dB', {}, '\u2212∞'],
  ])('%s %s', (value, unit, options, text) => {
    expect(formatQuantity(value, unit, options)).toBe(text);
  });
});

describe('a quantity for editing', () => {
  it.each([
    [16e6, 'Hz', '16M'],
    [44_100, 'Hz', '44.1k'],
    [440, 'Hz', '440'],
    [4700, 'Ω', '4700'],
    [1e-7, 'F', '100n'],
    [0.1 + 0.2, 'V', '0.30000000000000004'],
    [12_345_678, 'Hz', '12345678'],
  ])('%d %s', (value, unit, text) => {
    expect(quantityText(value, unit)).toBe(text);
  });

  it('reads back as the same double in every unit', () => {
    const units = fc.constantFrom('', 'Hz', 'V', 'Ω', 'F', 's', 'dB', '%', '°', 'entries');
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), units, (value, unit) => {
        const reading = read(quantityText(value, unit), unit);
        // -0 and 0 are the same quantity.
        expect(reading).toEqual(number(value === 0 ? 0 : value));
      }),
      { seed: 7, numRuns: 2000 },
    );
  });
});
