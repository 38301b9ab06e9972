import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { withExponentInSight } from '../../src/components/number-text.ts';

describe('a number in a narrow field', () => {
  it.each([
    ['3.8981718325193755e-17', '3.89…e-17'],
    ['-1.2246467991473532e-16', '-1.2…e-16'],
    ['1.7976931348623157e+308', '1.7…e+308'],
    ['3.9e-17', '3.9e-17'],
    ['1e-7', '1e-7'],
    ['0.6366197723675814', '0.6366197723675814'],
    ['4.7k', '4.7k'],
    ['abc', 'abc'],
  ])('%s shows as %s', (text, shown) => {
    expect(withExponentInSight(text)).toBe(shown);
  });

  it('keeps sign, first digits and exponent of any double, and says where digits are left out', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const text = String(value);
        const shown = withExponentInSight(text);
        if (shown === text) return;
        const [mantissa, exponent] = shown.split('…');
        expect(text.startsWith(mantissa)).toBe(true);
        expect(mantissa).toMatch(/^-?\d\.\d/);
        expect(text.endsWith(exponent)).toBe(true);
        expect(exponent).toMatch(/^e[+-]\d+$/);
        expect(shown.length).toBeLessThanOrEqual(10);
      }),
      { seed: 41 },
    );
  });
});
