import { describe, expect, it } from 'vitest';
import { numbersInC, numbersInCpp, strictWarnings } from './support/compilers.ts';
import { exported, pair, sine, tone } from './support/tables.ts';

// The judge is GCC: ISO/IEC 9899:1999, :2011, :2018 and ISO/IEC 14882:2017, as its manual's "Options Controlling C
// Dialect" has them. That the numbers are the engine's stored words needs no source: it is what an export is.

const cases = {
  '256 × 8': () => exported(tone({}), 'c99'),
  '256 × 1': () => exported(tone({ bits: 1 }), 'c99'),
  '2 × 8': () => exported(pair, 'c99'),
  '100 × 8, complemented': () => exported(tone({ length: 100, complement: true }), 'c99'),
  '100 × 8 in two’s complement': () => exported(tone({ length: 100, coding: 'twos-complement' }), 'c99'),
  '100 × 12 in two’s complement': () =>
    exported(tone({ length: 100, bits: 12, coding: 'twos-complement' }), 'c99'),
  '1000 × 9': () => exported(tone({ length: 1000, bits: 9 }), 'c99'),
  '65536 × 16': () => exported(tone({ length: 65_536, bits: 16 }), 'c99'),
  '65536 × 16 in two’s complement, down to −32768': () =>
    exported(tone({ length: 65_536, bits: 16, coding: 'twos-complement' }), 'c99'),
  'the first quarter of 256 × 8': () => exported(sine({ sampleAt: 'centre', fold: 'quarter' }), 'c99'),
};

describe('c99 export, every warning an error', () => {
  it.each(Object.entries(cases))('holds the stored words of %s', async (_title, render) => {
    const { table, files } = render();
    const numbers = await numbersInC(files, 'fog_tone', ['-std=c99', ...strictWarnings]);
    expect(numbers).toEqual(Array.from(table.stored));
  });

  it.each(['-std=c11', '-std=c17'])('compiles with %s too', async (standard) => {
    const { table, files } = exported(tone({ length: 100, bits: 16, coding: 'twos-complement' }), 'c99');
    const numbers = await numbersInC(files, 'fog_tone', [standard, ...strictWarnings, '-Wconversion']);
    expect(numbers).toEqual(Array.from(table.stored));
  });

  it('is read from C++17 through the same header', async () => {
    const { table, files } = exported(tone({ length: 100, coding: 'twos-complement' }), 'c99');
    const numbers = await numbersInCpp(files, 'fog_tone', ['-std=c++17', ...strictWarnings]);
    expect(numbers).toEqual(Array.from(table.stored));
  });

  it('stores each word in the smallest type of <stdint.h> that holds it', () => {
    const typeOf = (table: Parameters<typeof tone>[0]) =>
      /const (\w+) fog_tone/.exec(exported(tone(table), 'c99').files[1].text)?.[1];
    expect(typeOf({ bits: 1 })).toBe('uint8_t');
    expect(typeOf({ bits: 8 })).toBe('uint8_t');
    expect(typeOf({ bits: 9 })).toBe('uint16_t');
    expect(typeOf({ bits: 8, coding: 'twos-complement' })).toBe('int8_t');
    expect(typeOf({ bits: 16, coding: 'twos-complement' })).toBe('int16_t');
  });
});
