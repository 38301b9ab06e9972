import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { withExponentInSight } from '../../src/components/number-text.ts';

describe('a number in a narrow field', () => {
  it.each([
    ['3.8981718325193755e-17', 9, '3.89…e-17'],
    ['3.8981718325193755e-17', 6, '3…e-17'],
    ['3.8981718325193755e-17', 4, '…e-17'],
    ['-1.2246467991473532e-16', 9, '-1.2…e-16'],
    ['-1.2246467991473532e-16', 6, '…e-16'],
    ['1.7976931348623157e+308', 10, '1.79…e+308'],
    ['1.5e-7', 5, '1…e-7'],
    ['3.9e-17', 7, '3.9e-17'],
    ['0.6366197723675814', 6, '0.6366197723675814'],
    ['4.7k', 2, '4.7k'],
    ['abc', 1, 'abc'],
  ])('%s in %i characters is %s', (text, room, shown) => {
    expect(withExponentInSight(text, room)).toBe(shown);
  });

  it('keeps the exponent of any double and as many of its first digits as there is room for', () => {
    fc.assert(
      fc.property(
        fc.double({ noNaN: true, noDefaultInfinity: true }),
        fc.integer({ min: 6, max: 24 }),
        (value, room) => {
          const text = String(value);
          const shown = withExponentInSight(text, room);
          if (shown === text) {
            expect(text.length <= room || !text.includes('e')).toBe(true);
            return;
          }
          const [digits, exponent] = shown.split('…');
          expect(text.startsWith(digits)).toBe(true);
          expect(digits).toMatch(/^$|\d$/);
          expect(text.endsWith(exponent)).toBe(true);
          expect(shown.length).toBeLessThanOrEqual(room);
          expect(shown.length).toBeGreaterThanOrEqual(room - 2);
        },
      ),
      { seed: 41 },
    );
  });
});
