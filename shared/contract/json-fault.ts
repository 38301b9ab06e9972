/** Where a text stops being JSON (RFC 8259). */
export interface JsonFault {
  /** From 1. */
  readonly line: number;
  /** From 1, in UTF-16 code units. */
  readonly column: number;
  /** What stands there, in a few characters, or that the text ends. */
  readonly found: string;
  /** What could stand there, in words. */
  readonly allowed: string;
}

type Expected = 'value' | 'first value' | 'key' | 'first key' | 'colon' | 'next' | 'end';

const allowedWords = {
  value: 'a JSON value',
  'first value': 'a JSON value or "]"',
  key: 'a field name in double quotes',
  'first key': 'a field name in double quotes or "}"',
  colon: '":"',
  end: 'nothing more',
} as const;

const number = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const literal = /true|false|null/y;
const blanks = /[ \t\n\r]*/y;
const escape = /\\(?:["\\/bfnrt]|u[0-9A-Fa-f]{4})/y;

/**
 * Finds the first place at which a text cannot go on to be JSON; `undefined` where all of it is. It keeps a list of
 * what is open, and does not recurse: nesting may be made to exhaust the stack.
 */
export function findJsonFault(text: string): JsonFault | undefined {
  const open: ('{' | '[')[] = [];
  let expected: Expected = 'value';
  let at = 0;

  const fault = (offset: number, allowed: string) => describe(text, offset, allowed);
  const afterValue = (): Expected => (open.length === 0 ? 'end' : 'next');

  for (;;) {
    at = endOf(blanks, text, at) ?? at;
    const character = text[at];
    const innermost = open.at(-1);
    if (character === undefined && expected === 'end') return undefined;

    const closes =
      (character === ']' && innermost === '[' && (expected === 'next' || expected === 'first value')) ||
      (character === '}' && innermost === '{' && (expected === 'next' || expected === 'first key'));
    if (closes) {
      open.pop();
      expected = afterValue();
      at += 1;
      continue;
    }

    switch (expected) {
      case 'value':
      case 'first value': {
        if (character === '{' || character === '[') {
          open.push(character);
          expected = character === '{' ? 'first key' : 'first value';
          at += 1;
          continue;
        }
        const end =
          character === '"' ? scanString(text, at) : (endOf(number, text, at) ?? endOf(literal, text, at));
        if (end === undefined) return fault(at, allowedWords[expected]);
        if (typeof end !== 'number') return fault(end.offset, end.allowed);
        expected = afterValue();
        at = end;
        continue;
      }
      case 'key':
      case 'first key': {
        if (character !== '"') return fault(at, allowedWords[expected]);
        const end = scanString(text, at);
        if (typeof end !== 'number') return fault(end.offset, end.allowed);
        expected = 'colon';
        at = end;
        continue;
      }
      case 'colon':
        if (character !== ':') return fault(at, allowedWords.colon);
        expected = 'value';
        break;
      case 'next':
        if (character !== ',') return fault(at, innermost === '{' ? '"," or "}"' : '"," or "]"');
        expected = innermost === '{' ? 'key' : 'value';
        break;
      case 'end':
        return fault(at, allowedWords.end);
    }
    at += 1;
  }
}

/** Offset behind what a sticky pattern matches at a place. */
function endOf(pattern: RegExp, text: string, at: number): number | undefined {
  pattern.lastIndex = at;
  return pattern.test(text) ? pattern.lastIndex : undefined;
}

/** Offset behind the string that opens at a place, or what is wrong with it. */
function scanString(text: string, start: number): number | { offset: number; allowed: string } {
  let at = start + 1;
  while (at < text.length) {
    const character = text[at];
    if (character === '"') return at + 1;
    if (character < ' ') return { offset: at, allowed: 'a closing quote or an escaped character' };
    if (character === '\\') {
      const end = endOf(escape, text, at);
      if (end === undefined) return { offset: at, allowed: 'an escape of JSON' };
      at = end;
    } else {
      at += 1;
    }
  }
  return { offset: at, allowed: 'a closing quote' };
}

function describe(text: string, offset: number, allowed: string): JsonFault {
  const before = text.slice(0, offset);
  const line = before.split('\n').length;
  const column = offset - (before.lastIndexOf('\n') + 1) + 1;
  const excerpt = /^[\w.+-]{1,20}|^[^]/u.exec(text.slice(offset, offset + 24))?.[0];
  return {
    line,
    column,
    found: excerpt === undefined ? 'the end of the text' : JSON.stringify(excerpt),
    allowed,
  };
}
