import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import { readCode } from '../../shared/imports/index.ts';
import { holds } from './support/seeded.ts';

function refusalOf(work: () => unknown): string {
  try {
    work();
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
  throw new Error('nothing was refused');
}

const only = (text: string) => {
  const { arrays, refused } = readCode(text);
  expect(refused).toEqual([]);
  expect(arrays).toHaveLength(1);
  return arrays[0];
};

describe('arrays in C and C++', () => {
  it.each([
    ['const uint8_t a[4] = { 0, 0x7F, 0b101, 017 };', [0, 127, 5, 15]],
    [
      "static const uint16_t a[] PROGMEM = {1'000u, 0xFF'FFuL, 'a', '\\n', '\\x41', '\\101',};",
      [1000, 65535, 97, 10, 65, 65],
    ],
    ['int8_t a[] = { -128, +127, -(3), - -4, 0xFF };', [-128, 127, -3, 4, -1]],
    ['unsigned char a[6] = {1, 2};', [1, 2, 0, 0, 0, 0]],
    [
      '#define TOP (0x80)\n#define LOW -TOP\nint16_t a[TWO] = { TOP, LOW };\n'.replace('TWO', '2'),
      [128, -128],
    ],
    ['#define N 3 /* entries */\n#define V 7 // each\nu8 a[N] = { V, V, V };', [7, 7, 7]],
    ['#define A 1\n#undef A\n#define A 2\nu8 a[] = { A };', [2]],
    ['#if 0\nu8 a[] = { 1 };\n#else\nu8 b[] = { 2 };\n#endif', [2]],
    ['#if 1\nu8 a[] = { 1 };\n#elif X\nu8 b[] = { 2 };\n#endif', [1]],
    ['const std::array<std::uint8_t, 3> a{{ 1, 2, 3 }};', [1, 2, 3]],
    ['constexpr std::int16_t a[]{-1, 2};', [-1, 2]],
    ['u8 a[] [[gnu::aligned(4)]] __attribute__((section(".rodata"))) = { 1 /* , 9 */, // 8,\n 2 };', [1, 2]],
    ['void f(int x[]) { return; } const char* s = "u8 b[] = {1};"; u8 a[] = { 3 };', [3]],
    ['u8 a[] = { 1,\\\n 2 };', [1, 2]],
  ])('%j', (text, values) => {
    expect(only(text).values).toEqual(values);
  });

  it('of several names each, with what is wrong of the others', () => {
    const { arrays, refused } = readCode(
      [
        'uint8_t one[] = { 1 }, two[] = { 2, 2 };',
        'uint8_t nested[2][2] = { { 1, 2 }, { 3, 4 } };',
        'uint8_t placed[] = { [3] = 1 };',
        'float level[] = { 0.5f };',
        'const char *names[] = { "a" };',
        'int16_t last[] = { -3 };',
      ].join('\n'),
    );
    expect(arrays.map(({ name, line, wordBits, isSigned }) => [name, line, wordBits, isSigned])).toEqual([
      ['one', 1, 8, false],
      ['two', 1, 8, false],
      ['last', 6, 16, true],
    ]);
    expect(refused.map(({ name, line, problem }) => [name, line, problem.path, problem.value])).toEqual([
      ['nested', 2, 'line 2, column 9', 'an array of 2 dimensions'],
      ['placed', 3, 'line 3, column 22', 'an entry that names its place'],
      ['level', 4, 'line 4, column 7', 'an array of float'],
      ['names', 5, 'line 5, column 13', 'an array of pointers'],
    ]);
  });

  it('as a bare list, in braces or without', () => {
    expect(only('  0x80, 0x83,\n 0x86 ,').values).toEqual([128, 131, 134]);
    expect(only('{ 1, -2, 300 };')).toMatchObject({ values: [1, -2, 300], wordBits: 16, isSigned: true });
  });

  it('back as they were, however they are written', () => {
    const written = fc.constantFrom(
      (n: number) => String(n),
      (n: number) => `0x${n.toString(16).toUpperCase()}u`,
      (n: number) => `0b${n.toString(2)}`,
      (n: number) => `0${n.toString(8)}`,
      (n: number) => `${n} /* ${n + 1}, */`,
      (n: number) => String(n).replace(/(\d)(?=(?:\d{3})+$)/g, "$1'"),
    );
    holds(
      fc.property(
        fc.array(fc.tuple(fc.integer({ min: 0, max: 65_535 }), written), { minLength: 1, maxLength: 40 }),
        fc.constantFrom(',', ', ', ',\n\t', ' ,\r\n'),
        (entries, between) => {
          const text = `const uint16_t t[] = {${entries.map(([n, write]) => write(n)).join(between)}};`;
          expect(only(text).values).toEqual(entries.map(([n]) => n));
        },
      ),
    );
  });

  it.each([
    ['u8 a[] = {1,\n 2, 3', 'line 1, column 10: "{" that is never closed'],
    ['u8 a[] = {1,\n 2, 3;\n', 'line 2, column 6: ";" is not allowed; allowed: "," or "}"'],
    ['u8 a[] = {1,\n 2 3 }', 'line 2, column 4: "3" is not allowed; allowed: "," or "}" behind an entry'],
    [
      'u8 a[] = {\n#include "t.inc"\n};',
      'line 2, column 1: "#include \\"t.inc\\"" is not allowed; allowed: the numbers',
    ],
    [
      'u8 a[] = {\n#if X\n1\n#endif\n};',
      'line 2, column 1: "#if X" is not allowed; allowed: entries without directives',
    ],
    ['#define V(x) x\nu8 a[] = { V(1) };', 'line 2, column 12: "V", called with arguments,'],
    ['u8 a[] = { MANY };', 'line 1, column 12: "MANY", which no #define above gives a number,'],
    [
      '#ifdef X\n#define A 1\n#else\n#define A 2\n#endif\nu8 a[] = { A };',
      'line 6, column 12: "A", defined in two ways',
    ],
    ['#define A A\nu8 a[] = { A };', 'line 1, column 11: "A", which leads back to itself,'],
    [
      'u8 a[] = { 1 + 2 };',
      'line 1, column 14: "+" is not allowed; allowed: "," or "}": entries are plain numbers',
    ],
    ['u8 a[] = { (u8)1 };', 'line 1, column 13: "u8", which no #define above'],
    [
      'uint8_t a[] = { 256 };',
      'line 1, column 17: 256 is not allowed; allowed: -128 to 255, as uint8_t holds',
    ],
    ['u8 a[] = { 089 };', 'line 1, column 12: "089", a digit above 7 in an octal number,'],
    ['u8 a[] = { 0xG };', 'line 1, column 12: "0xG", not a number of C,'],
    ['u8 a[] = { 1.5 };', 'line 1, column 12: "1.5", a decimal fraction; such columns come in as CSV,'],
    ['u8 a[] = { 1ulu };', 'line 1, column 12: "1ulu", a suffix that C does not have'],
    ["u8 a[] = { 'ab' };", 'line 1, column 12: "\'ab\'", more than one character,'],
    ["u16 a[] = { '\\xff' };", 'line 1, column 13: a character beyond 127'],
    ['u8 a[2] = { 1, 2, 3 };', 'line 1, column 11: 3 entries is not allowed; allowed: the 2 that'],
    ['u8 a[] = { /* 1 };', 'line 1, column 12: "/*" that is never closed'],
    ['u8 a[] = {};', 'line 1, column 10: an empty list'],
    ['u8 a[] = "abc";', 'line 1, column 10: a string'],
    ['int main(void) { return 0; }', 'line 1, column 1: a text without an array'],
    ['  ', 'file: an empty text'],
  ])('%j is refused by place', (text, message) => {
    expect(refusalOf(() => readCode(text))).toContain(message);
  });
});

describe('data in assembly source', () => {
  it('runs from label to label, in every notation', () => {
    const { arrays } = readCode(
      [
        '        .equ TOP, 0x7f',
        'LOW = -3',
        'sine:   .byte 1, 0x2, 0b11, 010 ; first',
        "        .byte 'a, 'b', '\\n', $ff, 0Ah // second",
        '/* none */ .byte TOP, LOW # third',
        'wide:',
        '        .word 1, 70000',
        '        ret',
        'next:   .2byte -1, 2 @ fourth',
        'last    db 1, 2',
      ].join('\n'),
    );
    expect(arrays.map(({ name, wordBits, isSigned, values }) => [name, wordBits, isSigned, values])).toEqual([
      ['sine', 8, false, [1, 2, 3, 8, 97, 98, 10, 255, 10, 127, 253]],
      ['wide', 32, false, [1, 70_000]],
      ['next', 16, true, [-1, 2]],
      ['last', 8, false, [1, 2]],
    ]);
  });

  it.each([
    ['a: .byte 1, 300', 'line 1, column 13: 300 is not allowed; allowed: -128 to 255, as .byte holds'],
    ['a: .byte 1,\n', 'line 1, column 12: "", nothing at all,'],
    ['a: .byte 1 + 2', 'line 1, column 10: "1 + 2", not a plain number,'],
    ['a: .byte 1\n .word 2', 'line 2, column 2: .word behind .byte'],
    ['a: .byte 1\n .rept 4\n .byte 2\n .endr', 'line 2, column 2: "rept"'],
    ['a: .byte 1\n .incbin "x"', 'line 2, column 2: "incbin"'],
    ['a: .byte 1 ; .byte 2', 'line 1, column 12: data behind ";"'],
    ['a: .byte X', 'line 1, column 10: "X", a symbol without a plain number above,'],
    ['a: .byte', 'line 1, column 4: .byte without numbers'],
    ['a: .byte "hi"', 'line 1, column 10: "\\"hi\\"", not a plain number,'],
  ])('%j is refused by place', (text, message) => {
    expect(refusalOf(() => readCode(text))).toContain(message);
  });
});
