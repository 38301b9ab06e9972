import { quoted, refuseAt } from '../refuse.ts';
import { CLexer } from './c-lexer.ts';
import type { Macros } from './c-macros.ts';
import { cCharacter, cInteger, literalsAllowed } from './literals.ts';

/** Macros within macros, and brackets within brackets. */
const deepest = 32;
/** Units of a macro that may be a plain number: spaces, comments and brackets included. */
const longestMacro = 400;

export interface EntryNumber {
  readonly value: number;
  /** From a character beyond 127: negative where `char` has a sign. */
  readonly isHighCharacter: boolean;
}

/**
 * Reads one number from the token the lexer stands on: signs, brackets, an integer, a character or a macro of such.
 * The lexer then stands behind it.
 *
 * @throws {Refusal} where something else stands there
 */
export function readNumberIn(lexer: CLexer, macros: Macros, depth = 0): EntryNumber {
  const { text, start, end } = lexer;
  if (depth > deepest)
    refuseAt(text, start, 'deeper brackets or macros', `at most ${deepest} of them in each other`);
  switch (lexer.kind) {
    case 'number': {
      const plain = lexer.plainNumber;
      if (plain >= 0) {
        lexer.next();
        return { value: plain, isHighCharacter: false };
      }
      const read = cInteger(lexer.word);
      if ('fault' in read)
        refuseAt(text, start, `${quoted(text, start, end)}, ${read.fault},`, literalsAllowed);
      lexer.next();
      return { value: read.value, isHighCharacter: false };
    }
    case 'character': {
      const read = cCharacter(lexer.word);
      if ('fault' in read)
        refuseAt(text, start, `${quoted(text, start, end)}, ${read.fault},`, literalsAllowed);
      lexer.next();
      return { value: read.value, isHighCharacter: read.value > 127 };
    }
    case 'word':
      return readMacro(lexer, macros, depth);
    case 'sign':
      return readSigned(lexer, macros, depth);
    default:
      return refuseToken(lexer);
  }
}

function readSigned(lexer: CLexer, macros: Macros, depth: number): EntryNumber {
  const { text, start } = lexer;
  if (lexer.is('-') || lexer.is('+')) {
    const sign = lexer.is('-') ? -1 : 1;
    lexer.next();
    const number = readNumberIn(lexer, macros, depth + 1);
    if (sign < 0 && number.isHighCharacter) refuseHighCharacter(text, start);
    return { ...number, value: number.value === 0 ? 0 : sign * number.value };
  }
  if (lexer.is('(')) {
    lexer.next();
    const number = readNumberIn(lexer, macros, depth + 1);
    if (!lexer.is(')')) refuseToken(lexer, '")": no calculations, no casts');
    lexer.next();
    return number;
  }
  return refuseToken(lexer);
}

export const refuseHighCharacter = (text: string, start: number): never =>
  refuseAt(
    text,
    start,
    'a character beyond 127, negative to some compilers and not to others,',
    'its number',
  );

function readMacro(lexer: CLexer, macros: Macros, depth: number): EntryNumber {
  const { text, start } = lexer;
  const name = lexer.word;
  const known = macros.numbers.get(name);
  const macro = macros.get(name);
  lexer.next();
  if (known !== undefined) return { value: known, isHighCharacter: false };
  if (macro?.kind === 'function' || (macro === undefined && lexer.is('('))) {
    refuseAt(text, start, `${quote(name)}, called with arguments,`, 'a number, or a macro of a plain number');
  }
  if (macro === undefined) {
    refuseAt(
      text,
      start,
      `${quote(name)}, which no #define above gives a number,`,
      'a number, or a macro of a plain number',
    );
  }
  if (macro.kind === 'two-values') {
    refuseAt(
      text,
      start,
      `${quote(name)}, defined in two ways under #if or #else,`,
      'a macro with one value',
    );
  }
  if (macro.to - macro.from > longestMacro) {
    refuseAt(
      text,
      start,
      `${quote(name)}, a macro of more than a plain number,`,
      'a macro of a plain number',
    );
  }
  const body = new CLexer(text, macro.from, macro.to, true);
  body.next();
  if (body.kind === 'end')
    refuseAt(text, start, `${quote(name)}, a macro of nothing,`, 'a macro of a plain number');
  if (macros.open.has(name)) {
    refuseAt(text, start, `${quote(name)}, which leads back to itself,`, 'a macro of a plain number');
  }
  macros.open.add(name);
  try {
    const number = readNumberIn(body, macros, depth + 1);
    if (!body.isKind('end')) {
      refuseAt(
        text,
        start,
        `${quote(name)}, a macro of more than a plain number,`,
        'a macro of a plain number',
      );
    }
    if (!number.isHighCharacter) macros.numbers.set(name, number.value);
    return number;
  } finally {
    macros.open.delete(name);
  }
}

const quote = (name: string) => quoted(name, 0, name.length);

/** Says of any token that it is no entry. */
export function refuseToken(lexer: CLexer, allowed = literalsAllowed): never {
  const { text, start, end, kind } = lexer;
  if (kind === 'end') refuseAt(text, start, 'the end of the text', allowed);
  if (kind === 'directive') {
    const include = /^#\s*include\b/.test(text.slice(start, Math.min(end, start + 40)));
    refuseAt(
      text,
      start,
      quoted(text, start, end),
      include
        ? 'the numbers themselves: paste or choose the included file'
        : 'entries without directives between them',
    );
  }
  if (kind === 'string') refuseAt(text, start, 'a string', allowed);
  if (lexer.is('{')) refuseAt(text, start, 'a list within the list', 'one flat list of numbers');
  if (lexer.is('.') || lexer.is('[')) {
    refuseAt(text, start, 'an entry that names its place', 'entries in order, without designators');
  }
  refuseAt(text, start, quoted(text, start, end), allowed);
}
