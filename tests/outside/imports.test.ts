import { readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import { cutCycle, readCode, readIntelHex, readWav, type CodeArray } from '../../shared/imports/index.ts';
import { examplesOf, noise } from '../engine/support/seeded.ts';
import fc from 'fast-check';
import { inFolder, run } from './support/programs.ts';

/** Little-endian bytes of an array, as the machine that compiles here stores it. */
function bytesOf({ values, wordBits }: CodeArray): number[] {
  return values.flatMap((value) =>
    Array.from({ length: wordBits / 8 }, (_, k) => Math.floor(value / 2 ** (8 * k)) & 255),
  );
}

/** Bytes of each symbol of an object file's read-only data, by GNU nm and objcopy. */
async function symbolBytes(
  folder: string,
  object: string,
  section: string,
): Promise<(name: string, size: number) => number[]> {
  await run('objcopy', ['-O', 'binary', '-j', section, object, 'data.bin'], folder);
  const data = await readFile(join(folder, 'data.bin'));
  const listing = await run('nm', [object], folder);
  const places = new Map(
    [...listing.matchAll(/^([\da-f]+) \w (\S+)$/gm)].map(([, at, name]) => [name, Number.parseInt(at, 16)]),
  );
  return (name, size) => {
    const at = places.get(name);
    if (at === undefined) throw new Error(`${object} has no ${name}.`);
    return [...data.subarray(at, at + size)];
  };
}

// Source: GCC itself, and the C and C++ standards that it implements (C17 §6.4.4, §6.7.9; C++20 [lex.icon], [dcl.init.aggr]).
const inC = `#include <stdint.h>
#define ONE 1
#define TWO (2)
#define MINUS -ONE /* with a comment */
#define DEEP ((((TWO))))
#define LENGTH 6
#if 0
const uint8_t c01[] = { 99 };
#endif
const uint8_t c01[4] = { 0, 1, 2, 255 };
const uint8_t c02[] = { 0x00, 0X7f, 0xfF };
const uint8_t c03[] = { 0b0, 0B11111111, 0b1010 };
const uint8_t c04[] = { 0, 07, 010, 0377 };
const uint8_t c05[] = { 'a', '0', '\\n', '\\t', '\\\\', '\\'', '"', '\\"', '\\?', '\\a', '\\b', '\\f', '\\r', '\\v' };
const uint8_t c06[] = { '\\0', '\\7', '\\101', '\\x41', '\\x7f', '\\xff', '\\377' };
const int8_t c07[] = { -128, -1, 0, 1, 127 };
const int8_t c08[] = { 0xFF, 128, 255, +5, -(3), - - 4 };
const uint8_t c09[] = { -1, -128, 1 };
const uint8_t c10[8] = { 1, 2, 3 };
const uint8_t c11[] = { ONE, TWO, MINUS, DEEP, };
const uint8_t c12[LENGTH] = { ONE, TWO };
const uint16_t c13[] = { 0, 65535, 0xFFFFu, 1000U, 12l, 13UL, 14lu, 15LL, 16ull, 17LLU };
const int16_t c14[] = { -32768, 32767, 0x8000, -1 };
const uint32_t c15[] = { 4294967295u, 0xDEADBEEF, 0 };
const int32_t c16[] = { -2147483647, 2147483647, -1 };
const unsigned char c17[] = { 1 }, c18[3] = { 2, 2 }, c19[] = { 3, 3, 3 };
const signed char c20[] = { -5, 5 };
const char c21[] = { 'x', -3, 100 };
const unsigned short c22[] = { 1, 2 };
const short c23[] = { -1, 2 };
const unsigned int c24[] = { 7, 8 };
const int c25[] = { -7, 8 };
const unsigned c26[] = { 9 };
__attribute__((aligned(16))) const uint8_t c27[] __attribute__((used)) = { 1, /* 9, */ 2, // 9,
  3 };
const uint8_t c28[] =
{
  1,\\
  2,
  3
};
static const char *const aside = "const uint8_t c99[] = { 1 };";
const char *use(void) { return aside; }
int sum(const int x[], int n) { int s = 0; for (int i = 0; i < n; ++i) { s += x[i]; } return s; }
const uint_least8_t c29[] = { 200 };
extern const uint8_t c30[2];
const uint8_t c30[2] = { 0x12, 0x34 };
#undef ONE
#define ONE 11
const uint8_t c31[] = { ONE };
`;
const inCpp = `#include <array>
#include <cstdint>
extern const std::uint16_t d01[], d02[], d05[]; extern const std::uint8_t d03[];
extern const std::array<std::uint8_t, 4> d04;
const std::uint16_t d01[] = { 1'000, 0xFF'FF, 0b1111'0000, 0'17, 6'5'5'3'5u };
const std::uint16_t d02[]{ 1, 2, 3 };
alignas(8) const std::uint8_t d03[3] { 7 };
const std::array<std::uint8_t, 4> d04{{ 1, 2, 3, 4 }};
[[maybe_unused]] const std::uint16_t d05[] = { u8'a', 5 };
const char *raw = R"x(const std::uint8_t d99[] = { 1 };)x";
`;
// Source: GNU as (its manual, "Constants", ".byte", ".short", ".2byte", ".hword", ".long").
const inAssembly = `
        .equ TOP, 0x7f
LOW = -3
        .section .rodata
e01:    .byte 0, 1, 0xff, 0b101, 017, -1, -128
e02:    .byte 'a, 'b, TOP, LOW
e03:    .word 1, 0x1234, -2
e04:    .short 65535, -32768
e05:    .2byte 1, 2 ; .hword 3
e06:    .hword 0x7fff # a comment
        /* .byte 9 */
        .hword 4
e07:    .byte 1
        .byte 2, 3
e08:    .long 70000, -1
`.replace(' ; .hword 3', '');

it('arrays of C, C++ and assembly source are the bytes that compiler and assembler make of them', async () => {
  await inFolder(
    [
      { name: 'c.c', text: inC },
      { name: 'd.cpp', text: inCpp },
      { name: 'e.s', text: inAssembly },
    ],
    async (folder) => {
      await Promise.all([
        run('gcc', ['-std=gnu17', '-w', '-fno-common', '-c', 'c.c', '-o', 'c.o'], folder),
        run('g++', ['-std=c++20', '-w', '-c', 'd.cpp', '-o', 'd.o'], folder),
        run('as', ['e.s', '-o', 'e.o'], folder),
      ]);
      let count = 0;
      for (const [source, object] of [
        [inC, 'c.o'],
        [inCpp, 'd.o'],
        [inAssembly, 'e.o'],
      ]) {
        const wanted = await symbolBytes(folder, object, '.rodata');
        const { arrays, refused } = readCode(source);
        expect(refused).toEqual([]);
        for (const array of arrays) {
          const bytes = bytesOf(array);
          expect([array.name, bytes]).toEqual([array.name, wanted(array.name, bytes.length)]);
        }
        count += arrays.length;
      }
      expect(count).toBe(44);
    },
  );
});

// Source: SRecord (its manual pages srec_cat, srec_info, srec_intel).
it('Intel HEX images are those that srec_cat writes, by the addresses that srec_info tells', async () => {
  const image = fc.record({
    at: fc.uniqueArray(fc.integer({ min: 0, max: 200 }), { minLength: 1, maxLength: 4 }),
    width: fc.integer({ min: 11, max: 250 }),
  });
  await inFolder([], async (folder) => {
    for (const [index, { at, width }] of examplesOf(image, 6).entries()) {
      const parts = [...at]
        .sort((a, b) => a - b)
        .map((place, i) => ({
          address: place * 40_961,
          bytes: Uint8Array.from(noise(1000 + 977 * i, index + 1), (x) => Math.floor((x + 1) * 128)),
        }));
      const inputs = await Promise.all(
        parts.map(async ({ address, bytes }, i) => {
          await writeFile(join(folder, `${i}.bin`), bytes);
          return [`${i}.bin`, '-binary', '-offset', String(address)];
        }),
      );
      await run('srec_cat', [...inputs.flat(), '-o', 'out.hex', '-intel', `-line-length=${width}`], folder);
      const text = await readFile(join(folder, 'out.hex'), 'latin1');
      const segments = readIntelHex(text);
      expect(segments.map(({ address, bytes }) => ({ address, bytes }))).toEqual(parts);

      const told = await run('srec_info', ['out.hex', '-intel'], folder);
      const ranges = [...told.matchAll(/([\dA-F]+) - ([\dA-F]+)/g)].map(([, from, to]) => [
        Number.parseInt(from, 16),
        Number.parseInt(to, 16),
      ]);
      expect(segments.map(({ address, bytes }) => [address, address + bytes.length - 1])).toEqual(ranges);

      // What one refuses, so does the other: a digit of a data record is changed.
      const digit = text.indexOf('\n', 200) - 6;
      const damaged = `${text.slice(0, digit)}${text[digit] === '0' ? '1' : '0'}${text.slice(digit + 1)}`;
      await writeFile(join(folder, 'bad.hex'), damaged);
      expect(() => readIntelHex(damaged)).toThrow(Refusal);
      await expect(run('srec_info', ['bad.hex', '-intel'], folder)).rejects.toThrow(/checksum/i);
    }
  });
});

// Source: SoX, whose own conversion to 64-bit floating point is taken as what the file holds.
it('recordings are the samples that SoX reads from them', async () => {
  await inFolder([], async (folder) => {
    for (const format of [
      ['-b', '8', '-e', 'unsigned-integer'],
      ['-b', '16', '-e', 'signed-integer'],
      ['-b', '24', '-e', 'signed-integer'],
      ['-b', '32', '-e', 'signed-integer'],
      ['-b', '32', '-e', 'floating-point'],
      ['-b', '64', '-e', 'floating-point'],
    ]) {
      await run(
        'sox',
        [
          '-R',
          '-D',
          '-n',
          '-r',
          '44100',
          '-c',
          '2',
          ...format,
          'in.wav',
          'synth',
          '0.05',
          'sine',
          '441',
          'sine',
          '662',
          'gain',
          '-3',
        ],
        folder,
      );
      const file = await readFile(join(folder, 'in.wav'));
      for (const channel of [0, 1]) {
        await run('sox', ['-D', 'in.wav', '-t', 'f64', 'out.raw', 'remix', String(channel + 1)], folder);
        const raw = await readFile(join(folder, 'out.raw'));
        const wanted = new Float64Array(raw.buffer.slice(raw.byteOffset, raw.byteOffset + raw.length));
        const { samples, sampleRateHz } = readWav(file, channel);
        expect(sampleRateHz).toBe(44_100);
        expect(samples.length).toBe(wanted.length);
        // SoX works in 32-bit whole numbers.
        expect(samples.reduce((most, x, i) => Math.max(most, Math.abs(x - wanted[i])), 0)).toBeLessThan(
          2 ** -30,
        );
      }
    }
  });
});

// Source: SciPy, scipy.signal.resample (Fourier method), exact for a cycle that repeats.
it('a cycle brought to another length is the one that SciPy makes of it', async () => {
  const period = 101;
  const cycle = Array.from({ length: period }, (_, k) =>
    [1, 0.5, 0.3, 0.2, 0.1].reduce(
      (sum, a, i) => sum + a * Math.sin((2 * Math.PI * (2 * i + 1) * k) / period + i),
      0,
    ),
  );
  const recording = Float64Array.from({ length: 40 * period }, (_, k) => cycle[k % period]);
  const script = `import json, sys
from scipy.signal import resample
cycle, lengths = json.load(sys.stdin)
json.dump([list(resample(cycle, n)) for n in lengths], sys.stdout)
`;
  const lengths = [64, 101, 256, 1000];
  await inFolder(
    [
      { name: 'input.json', text: JSON.stringify([cycle, lengths]) },
      { name: 'resample.py', text: script },
    ],
    async (folder) => {
      const wanted = JSON.parse(
        await run('sh', ['-c', '/usr/bin/python3 resample.py < input.json'], folder),
      ) as number[][];
      lengths.forEach((length, index) => {
        const bounds = { startSample: 20 * period, endSample: 21 * period };
        const { values } = cutCycle(recording, bounds, length, { kind: 'none' });
        const furthest = values.reduce((most, x, k) => Math.max(most, Math.abs(x - wanted[index][k])), 0);
        // Kaiser's window at β = 9 keeps ripples near −90 dB.
        expect(furthest, `${length} values`).toBeLessThan(1e-4);
      });
    },
  );
});
