import { describe, expect, it } from 'vitest';
import { arrayNameFault, arrayNameFrom, arrayNameLength, inertText } from '../../shared/firmware/index.ts';

describe('array names', () => {
  it.each(['x', 'sine', 'fog_tone', 'Sine8', 'SINE', 'a1_b2', 'intx', 'tone', 'sine_table', 'sinx'])(
    'takes %s',
    (name) => {
      expect(arrayNameFault(name)).toBeUndefined();
    },
  );

  it.each([
    ['', 'an ASCII letter, then letters'],
    ['2tone', 'an ASCII letter, then letters'],
    ['a-b', 'an ASCII letter, then letters'],
    ['a b', 'an ASCII letter, then letters'],
    ['tön', 'an ASCII letter, then letters'],
    ['ѕine', 'an ASCII letter, then letters'],
    ['_x', 'an ASCII letter, then letters'],
    ['_X', 'an ASCII letter, then letters'],
    ['__x', 'an ASCII letter, then letters'],
    ['a__b', 'single underscores'],
    ['a_', 'not ending in an underscore'],
    ['a\n', 'an ASCII letter, then letters'],
    ['../x', 'an ASCII letter, then letters'],
    ['x'.repeat(200), `at most ${arrayNameLength.max} characters`],
    ['x'.repeat(arrayNameLength.max + 1), `at most ${arrayNameLength.max} characters`],
    ['int', 'no keyword of C or C++'],
    ['restrict', 'no keyword of C or C++'],
    ['class', 'no keyword of C or C++'],
    ['co_await', 'no keyword of C or C++'],
    ['constexpr', 'no keyword of C or C++'],
    ['loop', 'no keyword of Rust'],
    ['impl', 'no keyword of Rust'],
    ['Self', 'no keyword of Rust'],
    ['lambda', 'no keyword of Python'],
    ['pass', 'no keyword of Python'],
    ['None', 'no keyword of Python'],
    ['uint8_t', '<stdint.h> does not use'],
    ['int_least16_t', '<stdint.h> does not use'],
    ['INT8_MAX', '<stdint.h> does not use'],
    ['sin', 'the C library and compilers do not use'],
    ['sinf', 'the C library and compilers do not use'],
    ['main', 'the C library and compilers do not use'],
    ['signal', 'the C library and compilers do not use'],
    ['gamma', 'the C library and compilers do not use'],
    ['aux', 'every file system can store'],
    ['COM1', 'every file system can store'],
  ])('refuses %j', (name, allowed) => {
    expect(arrayNameFault(name)).toContain(allowed);
  });

  it('takes the longest name, all of whose offspring keep to 63 significant characters (C17 §5.2.4.1)', () => {
    const longest = 'x'.repeat(arrayNameLength.max);
    expect(arrayNameFault(longest)).toBeUndefined();
    expect(`${longest}_STEP_FOR_MILLIHZ`).toHaveLength(63);
  });

  it.each([
    ['Fog signal', 'fog_signal'],
    ['Töne à la carte', 'tone_a_la_carte'],
    ['--- Fog --- signal ---', 'fog_signal'],
    ['100 Hz', 'table_100_hz'],
    ['sin', 'sin_table'],
    ['Prog char', 'prog_char_table'],
    ['int', 'int_table'],
    ['霧笛', 'wave_table'],
    ['a_b__c', 'a_b_c'],
    ['*/ int x;', 'int_x'],
    ['..', 'wave_table'],
    ['w'.repeat(64), 'w'.repeat(arrayNameLength.max - 6)],
  ])('makes of %j the name %s', (name, made) => {
    expect(arrayNameFrom(name)).toBe(made);
  });
});

describe('text made inert', () => {
  it.each([
    ['plain Töne 霧笛 📯', 'plain Töne 霧笛 📯'],
    ['*/', '* /'],
    ['/*', '/ *'],
    ['/*/', '/ * /'],
    ['**//**', '** / / **'],
    ['see http://x', 'see http:/ /x'],
    ['??/', '? ?/'],
    ['???', '? ? ?'],
    ['C:\\tone', 'C:/tone'],
    ['*\\', '* /'],
    ['a\nb\rc\td', 'a b c d'],
    ['a\u2028b\u0085c', 'a b c'],
    ['*\u200b/', '* /'],
    ['x\u202ey', 'x y'],
    ['half \ud83d', 'half'],
    ['\ufffe', ''],
  ])('%j is %j', (text, inert) => {
    expect(inertText(text)).toBe(inert);
  });
});
