import { refuseAt } from '../refuse.ts';

export type TokenKind = 'end' | 'word' | 'number' | 'character' | 'string' | 'sign' | 'directive';

const isDigit = (unit: number) => unit >= 48 && unit <= 57;
const isLetter = (unit: number) =>
  (unit >= 97 && unit <= 122) || (unit >= 65 && unit <= 90) || unit === 95 || unit === 36 || unit > 127;
const hexLetter = (unit: number) => {
  const lower = unit | 32;
  return lower >= 97 && lower <= 102 ? lower - 87 : -1;
};
const isLineEnd = (unit: number) => unit === 10 || unit === 13;
const backslash = 92;

/**
 * Goes through C or C++ source token by token (C17 §6.4, C++20 [lex]): comments and blanks are passed over, a
 * preprocessing directive is one token. It keeps the place of the token it stands on and allocates nothing.
 */
export class CLexer {
  readonly text: string;
  readonly to: number;
  kind: TokenKind = 'end';
  start = 0;
  end: number;
  private isLineStart: boolean;

  /** @param isPlain within a directive, where `#` is a sign like any other */
  constructor(text: string, from = 0, to = text.length, isPlain = false) {
    this.text = text;
    this.to = to;
    this.end = from;
    this.isLineStart = !isPlain;
  }

  /** Whether it stands on this sign. */
  is(sign: string): boolean {
    return this.kind === 'sign' && this.text[this.start] === sign;
  }

  /** Whether it stands on a token of this kind. */
  isKind(kind: TokenKind): boolean {
    return this.kind === kind;
  }

  /**
   * The number that the token stands for where it is decimal or hexadecimal and nothing more, as nearly all entries
   * are; −1 where it has to be looked at closely.
   */
  get plainNumber(): number {
    const { text, start, end } = this;
    const isHex = text.charCodeAt(start) === 48 && (text.charCodeAt(start + 1) | 32) === 120;
    if (end - start > 10 || (isHex && end - start < 3)) return -1;
    if (!isHex && text.charCodeAt(start) === 48 && end - start > 1) return -1;
    let value = 0;
    for (let at = isHex ? start + 2 : start; at < end; at += 1) {
      const unit = text.charCodeAt(at);
      const digit = isDigit(unit) ? unit - 48 : isHex ? hexLetter(unit) : -1;
      if (digit < 0) return -1;
      value = value * (isHex ? 16 : 10) + digit;
    }
    return value;
  }

  get word(): string {
    return this.text.slice(this.start, this.end);
  }

  /** @throws {Refusal} where a comment, a string or a character is never closed */
  next(): TokenKind {
    const mayBeDirective = this.passBlanks();
    this.start = this.end;
    if (this.end >= this.to) return (this.kind = 'end');
    const unit = this.text.charCodeAt(this.end);
    if (mayBeDirective && unit === 35) {
      this.end = this.endOfDirective();
      return (this.kind = 'directive');
    }
    if (isDigit(unit) || (unit === 46 && isDigit(this.text.charCodeAt(this.end + 1)))) {
      this.passNumber();
      return (this.kind = 'number');
    }
    if (isLetter(unit)) {
      while (this.end < this.to && this.isWordUnit(this.end)) this.end += 1;
      return this.afterWord();
    }
    if (unit === 34) return this.passQuoted(34, 'string');
    if (unit === 39) return this.passQuoted(39, 'character');
    this.end += 1;
    return (this.kind = 'sign');
  }

  private isWordUnit(at: number): boolean {
    const unit = this.text.charCodeAt(at);
    return isLetter(unit) || isDigit(unit);
  }

  /** Answers whether a `#` here would begin a directive. */
  private passBlanks(): boolean {
    const { text, to } = this;
    let isLineStart = this.isLineStart && (this.end === 0 || this.kind === 'directive');
    while (this.end < to) {
      const unit = text.charCodeAt(this.end);
      if (isLineEnd(unit)) {
        isLineStart = this.isLineStart;
        this.end += 1;
      } else if (unit === 32 || (unit >= 9 && unit <= 12)) {
        this.end += 1;
      } else if (unit === backslash && isLineEnd(text.charCodeAt(this.end + 1))) {
        this.end += text.startsWith('\r\n', this.end + 1) ? 3 : 2;
      } else if (unit === 47 && text.charCodeAt(this.end + 1) === 42) {
        this.end = this.endOfBlockComment(this.end);
      } else if (unit === 47 && text.charCodeAt(this.end + 1) === 47) {
        this.end = this.endOfLine(this.end);
      } else break;
    }
    return isLineStart;
  }

  private endOfBlockComment(from: number): number {
    const close = this.text.indexOf('*/', from + 2);
    if (close < 0 || close >= this.to)
      refuseAt(this.text, from, '"/*" that is never closed', '"*/" after it');
    return close + 2;
  }

  /** A line goes on where it ends with a backslash (C17 §5.1.1.2, phase 2). */
  private endOfLine(from: number): number {
    let at = from;
    while (at < this.to) {
      const unit = this.text.charCodeAt(at);
      if (isLineEnd(unit)) return at;
      if (unit === backslash && isLineEnd(this.text.charCodeAt(at + 1))) {
        at += this.text.startsWith('\r\n', at + 1) ? 3 : 2;
      } else at += 1;
    }
    return this.to;
  }

  private endOfDirective(): number {
    let at = this.end;
    while (at < this.to) {
      const unit = this.text.charCodeAt(at);
      if (isLineEnd(unit)) return at;
      if (unit === backslash && isLineEnd(this.text.charCodeAt(at + 1))) {
        at += this.text.startsWith('\r\n', at + 1) ? 3 : 2;
      } else if (unit === 34) at = this.endOfQuoted(at, 34) ?? at + 1;
      else if (unit === 47 && this.text.charCodeAt(at + 1) === 42) at = this.endOfBlockComment(at);
      else if (unit === 47 && this.text.charCodeAt(at + 1) === 47) return this.endOfLine(at);
      else at += 1;
    }
    return this.to;
  }

  /** A preprocessing number (C17 §6.4.8): digits, letters, points, signs after e and p, separators between digits. */
  private passNumber(): void {
    while (this.end < this.to) {
      const unit = this.text.charCodeAt(this.end);
      const isSeparator = unit === 39 && this.isWordUnit(this.end + 1);
      const isExponentSign =
        (unit === 43 || unit === 45) && /[eEpP]/.test(this.text[this.end - 1]) && this.end > this.start;
      if (!this.isWordUnit(this.end) && unit !== 46 && !isSeparator && !isExponentSign) return;
      this.end += 1;
    }
  }

  /** A word before a quote is its prefix (`L'a'`, `u8"…"`); R"…( begins a raw string. */
  private afterWord(): TokenKind {
    const quote = this.text.charCodeAt(this.end);
    if ((quote !== 34 && quote !== 39) || this.end >= this.to || this.end - this.start > 3) {
      return (this.kind = 'word');
    }
    const prefix = this.word;
    if (!/^(?:L|u8|u|U)?R?$/.test(prefix)) return (this.kind = 'word');
    if (prefix.endsWith('R') && quote === 34) {
      const open = this.text.indexOf('(', this.end);
      const delimiter = open < 0 ? '' : this.text.slice(this.end + 1, open);
      const close = open < 0 || delimiter.length > 16 ? -1 : this.text.indexOf(`)${delimiter}"`, open);
      if (close < 0) refuseAt(this.text, this.start, 'a raw string that is never closed', 'its end');
      this.end = Math.min(this.to, close + delimiter.length + 2);
      return (this.kind = 'string');
    }
    if (prefix.endsWith('R')) return (this.kind = 'word');
    const { start } = this;
    const kind = this.passQuoted(quote, quote === 34 ? 'string' : 'character');
    this.start = start;
    return kind;
  }

  private passQuoted(quote: number, kind: 'string' | 'character'): TokenKind {
    const end = this.endOfQuoted(this.end, quote);
    if (end === undefined) {
      const what = kind === 'string' ? 'a string' : 'a character';
      refuseAt(
        this.text,
        this.end,
        `${what} that is never closed`,
        `${String.fromCharCode(quote)} on its line`,
      );
    }
    this.end = end;
    return (this.kind = kind);
  }

  private endOfQuoted(from: number, quote: number): number | undefined {
    let at = from + 1;
    while (at < this.to) {
      const unit = this.text.charCodeAt(at);
      if (unit === quote) return at + 1;
      if (unit === backslash) at += this.text.startsWith('\r\n', at + 1) ? 3 : 2;
      else if (isLineEnd(unit)) return undefined;
      else at += 1;
    }
    return undefined;
  }
}
