import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import { readCode, readIntelHex, wordsOf } from '../../shared/imports/index.ts';
import { holds } from './support/seeded.ts';

/** A record as the format has it, written from the specification. */
function record(offset: number, type: number, bytes: readonly number[]): string {
  const all = [bytes.length, offset >> 8, offset & 255, type, ...bytes];
  const checksum = (256 - (all.reduce((sum, byte) => sum + byte, 0) % 256)) % 256;
  return `:${[...all, checksum].map((byte) => byte.toString(16).padStart(2, '0').toUpperCase()).join('')}`;
}
const end = ':00000001FF';

const refusalOf = (lines: readonly string[]): string => {
  try {
    readIntelHex(lines.join('\n'));
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
  throw new Error('nothing was refused');
};

describe('an Intel HEX file', () => {
  it('comes back as it was, whatever the order and the size of its records', () => {
    holds(
      fc.property(
        fc.uint8Array({ minLength: 1, maxLength: 400 }),
        fc.integer({ min: 0, max: 0xffff_0000 }),
        fc.integer({ min: 1, max: 255 }),
        fc.boolean(),
        (bytes, address, size, isReversed) => {
          const lines: string[] = [];
          for (let at = 0; at < bytes.length;) {
            const here = address + at;
            // No record may run over the end of its 64 KiB.
            const count = Math.min(size, bytes.length - at, 0x10000 - (here % 0x10000));
            const upper = Math.floor(here / 0x10000);
            lines.push(
              `${record(0, 4, [upper >> 8, upper & 255])}\n${record(here % 0x10000, 0, [...bytes.slice(at, at + count)])}`,
            );
            at += count;
          }
          if (isReversed) lines.reverse();
          expect(readIntelHex([...lines, end, ''].join('\r\n'))).toMatchObject([{ address, bytes }]);
        },
      ),
    );
  });

  it('has a segment for each stretch, segmented addresses in sixteens, words in either order', () => {
    const text = [
      record(0x10, 0, [1, 2, 0xff]),
      record(0, 2, [0x10, 0]),
      record(4, 0, [9]),
      record(0, 3, [0, 0, 0, 0]),
      end,
    ].join('\n');
    const [first, second] = readIntelHex(text);
    expect([first.address, second.address]).toEqual([0x10, 0x10004]);
    expect(wordsOf(first, { wordBits: 16, byteOrder: 'low-first', isSigned: false })).toMatchObject({
      values: [0x0201],
      notes: ['The last byte makes no whole word and is left out.'],
    });
    expect(wordsOf(first, { wordBits: 16, byteOrder: 'high-first', isSigned: false }).values).toEqual([
      0x0102,
    ]);
    expect(wordsOf(first, { wordBits: 8, byteOrder: 'low-first', isSigned: true }).values).toEqual([
      1, 2, -1,
    ]);
    expect(readCode(text).language).toBe('intel-hex');
  });

  it.each([
    [[':0300300002337A1F', end], 'line 1, column 16: checksum "1F" is not allowed; allowed: "1E"'],
    [[record(0x30, 0, [1, 2]), record(0x31, 0, [3]), end], 'line 2, column 1: data at 0x0031 once more'],
    [[record(0x31, 0, [3]), record(0x30, 0, [1, 2]), end], 'line 2, column 1: data at 0x0031 once more'],
    [[record(0, 0, [1])], 'line 1, column 14: the end of the text is not allowed; allowed: an end record'],
    [[record(0, 0, [1]), end, record(1, 0, [1])], 'line 3, column 1: a record behind the end record'],
    [[end], 'line 1, column 1: a file without data records'],
    [[':0200000001FD', end], 'line 1, column 2: a record of 1 bytes of data is not allowed; allowed: the 2'],
    [[':00', end], 'line 1, column 2: a record of 0 bytes'],
    [[':0100000001FE0', end], 'line 1, column 14: half a byte'],
    [[':01000000G1FE', end], 'line 1, column 10: "G" is not allowed; allowed: a hexadecimal digit'],
    [['S00600004844521B', end], 'line 1, column 1: "S00600004844521B" is not allowed; allowed: a record'],
    [[record(0, 6, []), end], 'line 1, column 8: record type 6'],
    [[record(0, 4, [1]), end], 'line 1, column 2: 1 bytes of address'],
    [
      [record(0, 2, [0, 0]), record(0xffff, 0, [1, 2]), end],
      'line 2, column 1: a record over the end of its segment',
    ],
  ])('%j is refused by place', (lines, message) => {
    expect(refusalOf(lines)).toContain(message);
  });
});
