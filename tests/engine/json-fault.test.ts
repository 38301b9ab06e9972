import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findJsonFault } from '../../shared/contract/index.ts';

const isJson = (text: string) => {
  try {
    JSON.parse(text);
    return true;
  } catch {
    return false;
  }
};

describe('the place where a text stops being JSON', () => {
  it('is found just where JSON.parse refuses', () => {
    const pieces = fc.constantFrom(
      '{',
      '}',
      '[',
      ']',
      ',',
      ':',
      '"',
      '\\',
      '0',
      '-',
      '.',
      'e',
      '1',
      'a',
      '\n',
      ' ',
      'null',
      '"k"',
    );
    const rubbish = fc.array(pieces, { maxLength: 12 }).map((parts) => parts.join(''));
    const spoilt = fc.tuple(fc.json(), fc.nat(), fc.nat(3), pieces).map(([json, place, cut, piece]) => {
      const at = place % (json.length + 1);
      return json.slice(0, at) + piece + json.slice(at + cut);
    });
    fc.assert(
      fc.property(fc.oneof(rubbish, spoilt, fc.json()), (text) => {
        expect(findJsonFault(text) === undefined).toBe(isJson(text));
      }),
      { seed: 20_482, numRuns: 5000 },
    );
  });

  it('of a truncated text is its end, by line and column', () => {
    const text = JSON.stringify(
      { schema: 1, name: 'x "y"\n', source: { partials: [{ a: -1.5e-3 }, null, true] } },
      null,
      2,
    );
    for (let length = 0; length < text.length; length += 1) {
      const cut = text.slice(0, length);
      const fault = findJsonFault(cut);
      const lines = cut.split('\n');
      expect(fault).toBeDefined();
      // A word or number that is cut short is itself what cannot stand there.
      if (fault?.found === 'the end of the text') {
        expect([fault.line, fault.column]).toEqual([lines.length, (lines.at(-1) ?? '').length + 1]);
      } else {
        expect(fault?.found).toMatch(/^"(n|nu|nul|t|tr|tru|-|\.|e|e-|\\\\)"$/);
      }
    }
  });

  it.each([
    ['{"a": NaN}', 1, 7, '"NaN"', 'a JSON value'],
    ['{\n  "a": 1,\n}', 3, 1, '"}"', 'a field name in double quotes'],
    ['[1 2]', 1, 4, '"2"', '"," or "]"'],
    ['{"a" 1}', 1, 6, '"1"', '":"'],
    ["{'a': 1}", 1, 2, '"\'"', 'a field name in double quotes or "}"'],
    ['[01]', 1, 3, '"1"', '"," or "]"'],
    ['"a\nb"', 1, 3, '"\\n"', 'a closing quote or an escaped character'],
    ['"\\x"', 1, 2, '"\\\\"', 'an escape of JSON'],
    ['{} {}', 1, 4, '"{"', 'nothing more'],
    ['', 1, 1, 'the end of the text', 'a JSON value'],
  ])('%j: line %d, column %d', (text, line, column, found, allowed) => {
    expect(findJsonFault(text)).toEqual({ line, column, found, allowed });
  });

  it('is found at any depth', () => {
    expect(findJsonFault('['.repeat(200_000))).toMatchObject({
      column: 200_001,
      found: 'the end of the text',
    });
    expect(findJsonFault('['.repeat(200_000) + ']'.repeat(200_000))).toBeUndefined();
  });
});
