import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { Refusal } from '../../shared/contract/index.ts';
import { draftsOf, nameOfFile, readAny } from '../../shared/imports/index.ts';
import { toneOf, wavOf } from './support/recordings.ts';

const bytesOf = (text: string) => new TextEncoder().encode(text);
const tone = wavOf(
  toneOf({
    frequencyHz: 441,
    sampleRateHz: 44_100,
    seconds: 0.4,
    partials: [
      [1, 0],
      [0.4, 30],
    ],
  }).map((x) => x / 2),
  { bits: 16, isFloat: false, channels: 1, sampleRateHz: 44_100 },
);

describe('a file among many', () => {
  it('becomes drafts that build, by what is in it', () => {
    const files = [
      ['horn.wav', tone],
      ['ramp.csv', bytesOf('volts\n0\n0.5\n1\n')],
      ['old.c', bytesOf('const uint8_t one[] = { 1, 2, 3 }; const int8_t two[] = { -1, 1 };')],
      ['list.txt', bytesOf('{ 1, 2, 3 }')],
      ['image.hex', bytesOf(':0300300002337A1E\n:00000001FF\n')],
    ] as const;
    const drafts = files.map(([name, bytes]) => draftsOf(bytes, name));
    expect(drafts.map((made) => made.map(({ definition, words }) => [definition.name, words]))).toEqual([
      [['horn', 'one cycle of a recording, 441.0 Hz']],
      [['ramp', 'column of 3 numbers']],
      [
        ['one', 'array of 3 entries, 2 bits'],
        ['two', 'array of 2 entries, 2 bits'],
      ],
      [['list', 'array of 3 entries, 2 bits']],
      [['0x0030', 'array of 3 entries, 7 bits']],
    ]);
    for (const { definition } of drafts.flat()) expect(buildTable(definition).warnings).toEqual([]);
    const [{ definition }] = drafts[0];
    const { spectrum } = buildTable({ ...definition, table: { length: 256, bits: 16 } });
    expect(spectrum.amplitudes[2] / spectrum.amplitudes[1]).toBeCloseTo(0.2, 2);
  });

  it.each([
    ['odd.csv', 'a;1,500\nb;2,500\n', '1,500, which reads in two ways,'],
    ['two.csv', 't,v\n0,0.5\n1,0.25\n', 'several columns of numbers'],
    ['words.txt', 'hello', '"hello"'],
    ['open.c', 'u8 a[] = { 1', '"{" that is never closed'],
  ])('is refused by name where something would have to be asked: %s', (name, text, value) => {
    expect(() => draftsOf(bytesOf(text), name)).toThrow(Refusal);
    expect(() => draftsOf(bytesOf(text), name)).toThrow(value);
  });

  it('has its text read in UTF-8, UTF-16 and ISO 8859-1', () => {
    const text = 'µ;volts\n1;2.5\n2;3.5\n';
    const utf16 = new Uint8Array([
      0xff,
      0xfe,
      ...[...text].flatMap((c) => [c.charCodeAt(0) & 255, c.charCodeAt(0) >> 8]),
    ]);
    const big = utf16.map((_, i) => utf16[i ^ 1]);
    const latin = Uint8Array.from(text, (c) => c.charCodeAt(0));
    for (const bytes of [bytesOf(text), bytesOf(`\ufeff${text}`), utf16, big, latin]) {
      const file = readAny(bytes, 'x.csv');
      expect(file.kind === 'columns' && file.outcome.columns.map(({ name }) => name)).toEqual(['µ', 'volts']);
    }
  });

  it('is named after its file, as far as a name goes', () => {
    expect([nameOfFile('a/b/fog horn.tar.gz'), nameOfFile('.wav'), nameOfFile('x'.repeat(99))]).toEqual([
      'fog horn.tar',
      'brought in',
      'x'.repeat(64),
    ]);
  });
});
