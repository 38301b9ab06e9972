import { Refusal } from '../../contract/index.ts';
import { importLimits } from '../limits.ts';
import { placeOf, refuseAt } from '../refuse.ts';
import { CLexer } from './c-lexer.ts';
import { Macros } from './c-macros.ts';
import { readNumberIn, refuseHighCharacter, refuseToken } from './c-numbers.ts';
import { cTypeOf } from './c-types.ts';
import {
  asStored,
  rangeOfWord,
  widestWord,
  wordFor,
  type CodeArray,
  type FoundArrays,
  type RefusedArray,
  type WordType,
} from './code-array.ts';
import { Conditions } from './conditions.ts';

/** Words that may stand before `[` and name no array. */
const notNames = /^(?:return|delete|new|operator|case|sizeof|throw|co_return|co_yield|in)$/;

interface Declared {
  readonly name: string;
  /** Where the name stands. */
  readonly at: number;
  readonly words: readonly string[];
  readonly isPointer: boolean;
  /** Offset of the length between the brackets; undefined where there is none. */
  readonly lengthAt: number | undefined;
  readonly dimensions: number;
}

/**
 * Finds the arrays of whole numbers that C or C++ source defines with a list of entries; one bare list of numbers,
 * with or without its braces, is an array too. Nothing is preprocessed but macros of plain numbers, `#if 0` and
 * `#if 1`.
 *
 * @throws {Refusal} where the text cannot be gone through, or holds no array
 */
export function readCArrays(text: string): FoundArrays {
  const found = new Finder(text).run();
  if (found.arrays.length + found.refused.length > 0) return found;
  return { arrays: [readBareList(text)], refused: [] };
}

class Finder {
  private readonly lexer: CLexer;
  private readonly macros = new Macros();
  private readonly conditions = new Conditions();
  private readonly arrays: CodeArray[] = [];
  private readonly refused: RefusedArray[] = [];
  private words: string[] = [];
  private isPointer = false;

  constructor(text: string) {
    this.lexer = new CLexer(text);
  }

  run(): FoundArrays {
    const { lexer } = this;
    lexer.next();
    while (!lexer.isKind('end')) {
      if (lexer.isKind('word')) this.readWord();
      else if (lexer.is('[')) this.readBracket();
      else {
        if (lexer.isKind('directive')) this.readDirective();
        else if (lexer.is(';') || lexer.is('{') || lexer.is('}')) this.endStatement();
        else if (lexer.is('*')) this.isPointer = true;
        else if (lexer.is(',')) this.isPointer = false;
        lexer.next();
      }
    }
    return { arrays: this.arrays, refused: this.refused };
  }

  private endStatement(): void {
    this.words = [];
    this.isPointer = false;
  }

  private readDirective(): void {
    const goOn = this.conditions.note(this.lexer);
    if (goOn === undefined) this.macros.note(this.lexer, this.conditions.isOpen);
    else this.lexer.end = goOn;
    this.endStatement();
  }

  /** Words of one statement are kept: they tell the type. Longer ones than any declaration tell nothing. */
  private readWord(): void {
    const { lexer } = this;
    const { word, start } = lexer;
    if (this.words.length < 32) this.words.push(word);
    lexer.next();
    if (word === 'array' && lexer.is('<')) this.readStdArray(start);
    else if (lexer.is('[') && !notNames.test(word)) this.readDimensions(word, start);
  }

  private readBracket(): void {
    // An attribute, a lambda's captures, an index: none of them begins an array.
    this.passBrackets();
  }

  /** Passes `[…]`, answers where its content begins and whether there is any. */
  private passBrackets(): { at: number; isEmpty: boolean; isAttribute: boolean } {
    const { lexer } = this;
    lexer.next();
    const content = { at: lexer.start, isEmpty: lexer.is(']'), isAttribute: lexer.is('[') };
    let depth = 1;
    while (
      depth > 0 &&
      !lexer.isKind('end') &&
      !lexer.isKind('directive') &&
      !lexer.is(';') &&
      !lexer.is('{')
    ) {
      if (lexer.is('[')) depth += 1;
      if (lexer.is(']')) depth -= 1;
      lexer.next();
    }
    return content;
  }

  private readDimensions(name: string, at: number): void {
    const { lexer } = this;
    let lengthAt: number | undefined;
    let dimensions = 0;
    while (lexer.is('[')) {
      const content = this.passBrackets();
      if (content.isAttribute) continue;
      dimensions += 1;
      if (!content.isEmpty) lengthAt = content.at;
    }
    // `PROGMEM`, `__attribute__((…))` and the like.
    while (lexer.isKind('word') || lexer.is('(')) {
      if (lexer.isKind('word')) lexer.next();
      else if (!this.passRound()) return;
    }
    const words = this.words.slice(0, -1);
    const { isPointer } = this;
    this.readInitialiser({ name, at, words, isPointer, lengthAt, dimensions });
  }

  private passRound(): boolean {
    const { lexer } = this;
    let depth = 0;
    do {
      if (lexer.is('(')) depth += 1;
      if (lexer.is(')')) depth -= 1;
      lexer.next();
      if (lexer.isKind('end') || lexer.is(';') || lexer.is('{')) return false;
    } while (depth > 0);
    return true;
  }

  /** `std::array<uint8_t, 4> name = { … }`, one pair of braces more or less. */
  private readStdArray(start: number): void {
    const { lexer } = this;
    const words: string[] = [];
    lexer.next();
    while (lexer.isKind('word') || lexer.is(':')) {
      if (lexer.isKind('word')) words.push(lexer.word);
      lexer.next();
    }
    if (!lexer.is(',')) return;
    lexer.next();
    const lengthAt = lexer.start;
    while (lexer.isKind('word') || lexer.isKind('number')) lexer.next();
    if (!lexer.is('>') || lexer.next() !== 'word') return;
    const declared = { name: lexer.word, at: start, words, isPointer: false, lengthAt, dimensions: 1 };
    lexer.next();
    this.readInitialiser(declared, true);
  }

  private readInitialiser(declared: Declared, mayBeDoubled = false): void {
    const { lexer } = this;
    const hasSign = lexer.is('=');
    if (hasSign) lexer.next();
    if (lexer.isKind('string') && hasSign) {
      this.refuse(declared, () => refuseToken(lexer, 'a list of numbers in braces'));
      return;
    }
    if (!lexer.is('{')) return;
    if (this.arrays.length + this.refused.length >= importLimits.arrays) {
      refuseAt(lexer.text, declared.at, 'one more array', `at most ${importLimits.arrays} arrays in a file`);
    }
    const open = lexer.start;
    const isTaken = this.refuse(declared, () =>
      this.arrays.push(this.readArray(declared, open, mayBeDoubled)),
    );
    if (!isTaken) this.passList(open);
  }

  /** Answers whether the work went well; keeps the refusal where not. */
  private refuse(declared: Declared, work: () => void): boolean {
    try {
      work();
      return true;
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      const { line } = placeOf(this.lexer.text, declared.at);
      this.refused.push({ name: declared.name, line, problem: error.problems[0] });
      return false;
    }
  }

  /** From a brace to behind the one that closes it, or to the end. */
  private passList(open: number): void {
    const { lexer } = this;
    lexer.end = open;
    let depth = 0;
    do {
      lexer.next();
      if (lexer.is('{')) depth += 1;
      if (lexer.is('}')) depth -= 1;
    } while (depth > 0 && !lexer.isKind('end'));
    lexer.next();
  }

  private readArray(declared: Declared, open: number, mayBeDoubled: boolean): CodeArray {
    const { lexer, macros } = this;
    const { text } = lexer;
    const { name, at, words, isPointer, lengthAt, dimensions } = declared;
    if (dimensions > 1)
      refuseAt(text, at, `an array of ${dimensions} dimensions`, 'an array of one dimension');
    const type = isPointer ? undefined : cTypeOf(words);
    if (type === undefined) {
      const what = isPointer ? 'pointers' : `${words.at(-1) ?? 'its type'}`;
      refuseAt(text, at, `an array of ${what}`, 'an array of whole numbers of 8, 16 or 32 bits');
    }
    lexer.next();
    const isDoubled = mayBeDoubled && lexer.is('{');
    if (isDoubled) lexer.next();
    const given = readEntries(lexer, macros, type, open);
    if (isDoubled) {
      if (!lexer.is('}')) refuseToken(lexer, '"}"');
      lexer.next();
    }
    const length = lengthAt === undefined ? given.length : this.readLength(lengthAt);
    if (given.length > length) {
      refuseAt(text, open, `${given.length} entries`, `the ${length} that the array is declared with`);
    }
    return arrayOf({ name, line: placeOf(text, at).line, type, given, length });
  }

  private readLength(at: number): number {
    const lexer = new CLexer(this.lexer.text, at);
    lexer.next();
    const { value } = readNumberIn(lexer, this.macros);
    if (!lexer.is(']') && !lexer.is('>')) refuseToken(lexer, 'a plain number as the length');
    if (value < 1 || value > importLimits.imageBytes) {
      refuseAt(this.lexer.text, at, `a length of ${value}`, `1 to ${importLimits.imageBytes}`);
    }
    return value;
  }
}

function arrayOf({
  name,
  line,
  type,
  given,
  length,
}: {
  name: string;
  line: number;
  type: WordType;
  given: number[];
  length: number;
}): CodeArray {
  const missing = length - given.length;
  const filled = missing > 0 ? [`${missing} entries that are not given are 0, as C has it.`] : [];
  for (let i = 0; i < missing; i += 1) given.push(0);
  const wordBits = type.wordBits === 0 ? wordFor(given) : type.wordBits;
  const { values, isSigned, notes } = asStored(given, { wordBits, isSigned: type.isSigned });
  return { name, line, typeName: type.typeName, wordBits, isSigned, values, notes: [...filled, ...notes] };
}

/**
 * Entries up to and with the closing brace; the lexer then stands behind it.
 *
 * @param open where the brace is that opened the list; −1 for a list without braces, which ends with the text
 */
function readEntries(lexer: CLexer, macros: Macros, type: WordType, open: number): number[] {
  const { text } = lexer;
  const bits = type.wordBits === 0 ? widestWord : type.wordBits;
  const { min, max } = rangeOfWord(bits);
  const given: number[] = [];
  const isEnd = () => (open < 0 ? lexer.isKind('end') : lexer.is('}'));
  while (!isEnd()) {
    const { start } = lexer;
    if (lexer.isKind('end')) refuseAt(text, open, '"{" that is never closed', '"}" behind the last entry');
    const { value, isHighCharacter } = readNumberIn(lexer, macros);
    if (isHighCharacter && bits > 8) refuseHighCharacter(text, start);
    if (value < min || value > max) {
      refuseAt(
        text,
        start,
        `${value}`,
        `${min} to ${max}, as ${type.typeName || `a word of ${bits} bits`} holds`,
      );
    }
    given.push(value);
    if (lexer.is(',')) lexer.next();
    else if (!isEnd()) refuseBetween(lexer, open);
  }
  if (given.length === 0) refuseAt(text, Math.max(0, open), 'an empty list', 'at least 1 entry');
  if (open >= 0) lexer.next();
  return given;
}

function refuseBetween(lexer: CLexer, open: number): never {
  if (lexer.isKind('end') && open >= 0) {
    refuseAt(lexer.text, open, '"{" that is never closed', '"}" behind the last entry');
  }
  if (lexer.isKind('sign') && /[-+*/%|&^<>?~]/.test(lexer.text[lexer.start])) {
    refuseToken(lexer, '"," or "}": entries are plain numbers, not calculations');
  }
  refuseToken(lexer, '"," or "}" behind an entry');
}

/** A list of numbers alone, as somebody copies it out of a file. */
function readBareList(text: string): CodeArray {
  const lexer = new CLexer(text);
  const macros = new Macros();
  while (lexer.next() === 'directive') macros.note(lexer, false);
  if (lexer.isKind('end')) refuseAt(text, 0, 'a text without numbers', 'an array, or a list of numbers');
  const { start } = lexer;
  const isBraced = lexer.is('{');
  if (!isBraced && lexer.isKind('word') && macros.get(lexer.word) === undefined) {
    refuseAt(
      text,
      start,
      'a text without an array',
      'an array of numbers in C, C++ or assembly source, or a list of numbers',
    );
  }
  if (isBraced) lexer.next();
  const type = { typeName: '', wordBits: 0, isSigned: undefined };
  const given = readEntries(lexer, macros, type, isBraced ? start : -1);
  while (lexer.is(';')) lexer.next();
  if (!lexer.isKind('end')) refuseToken(lexer, 'nothing behind the list');
  return arrayOf({ name: '', line: placeOf(text, start).line, type, given, length: given.length });
}
