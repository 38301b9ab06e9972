import { jsonLanguage } from '@codemirror/lang-json';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { checkDefinition } from '../../shared/contract/index.ts';
import { placeOfPath, stepsOf } from '../../src/features/bench/source-text/json-place.ts';
import { changeBetween, readText } from '../../src/features/bench/source-text/read-text.ts';
import { writeDefinition } from '../../src/features/bench/source-text/write-definition.ts';
import { examples } from '../../src/features/bench/state/examples.ts';

describe('a definition written as text', () => {
  it.each(examples)('$title reads back to itself, in lines short enough to read', ({ work }) => {
    const text = writeDefinition(work.definition);
    expect(readText(text)).toEqual({ kind: 'definition', definition: work.definition });
    expect(Math.max(...text.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80);
  });

  it('is the same JSON, whatever it holds', () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 4 }), (value) => {
        expect(JSON.parse(writeDefinition(value))).toEqual(JSON.parse(JSON.stringify(value)));
      }),
      { seed: 7, numRuns: 300 },
    );
  });

  it('breaks long lists of numbers into lines, all of them kept', () => {
    const values = Array.from({ length: 1_000 }, (_, k) => Math.sin(k));
    const text = writeDefinition({ values });
    expect(text.split('\n').length).toBeGreaterThan(200);
    expect(JSON.parse(text)).toEqual({ values });
  });
});

describe('the place of a path in a text', () => {
  const text =
    '{ "name": "a",\n  "source": { "partials": [ { "harmonic": 1 }, { "harmonic": 0, "more": 1 } ] } }';
  const tree = jsonLanguage.parser.parse(text);
  const found = (path: string) => {
    const { from, to } = placeOfPath(tree, text, path);
    return text.slice(from, to);
  };

  it.each([
    ['source.partials[1].harmonic', '0'],
    ['source.partials[1].more', '1'],
    ['name', '"a"'],
    ['source', '"source"'],
    ['source.partials[1].amplitude', '{'],
    ['table.bits', '{'],
    ['definition', '{'],
  ])('%s is at %s', (path, there) => {
    expect(found(path)).toBe(there);
  });

  it('is found for every fault that a parse of a spoilt definition names', () => {
    const { definition } = examples[0].work;
    const spoilt = { ...definition, table: { ...definition.table, bits: 17, 'odd name': 1 } };
    const written = writeDefinition(spoilt);
    const checked = checkDefinition(JSON.parse(written));
    if (!('problems' in checked)) throw new Error('nothing is wrong');
    const marked = checked.problems.map(({ path }) => {
      const { from, to } = placeOfPath(jsonLanguage.parser.parse(written), written, path);
      return written.slice(from, to);
    });
    expect(marked).toEqual(expect.arrayContaining(['17', '1']));
  });

  it('reads names, indices and quoted names', () => {
    expect(stepsOf('source.parts[2]["odd name"].x')).toEqual(['source', 'parts', 2, 'odd name', 'x']);
  });
});

it('the change between two texts makes one of the other', () => {
  fc.assert(
    fc.property(fc.string({ maxLength: 12 }), fc.string({ maxLength: 12 }), (before, after) => {
      const change = changeBetween(before, after);
      const made =
        change === null ? before : before.slice(0, change.from) + change.insert + before.slice(change.to);
      expect(made).toBe(after);
    }),
    { seed: 3 },
  );
});
