import { refuseAt } from '../refuse.ts';
import type { CLexer } from './c-lexer.ts';

/** `0` and `1` are `#if 0`, `#if 1` and what follows from them; `open` is any other condition: all of it is read. */
type Condition = '0' | '1' | 'open';

/** Keeps count of `#if … #endif`. */
export class Conditions {
  private readonly stack: Condition[] = [];

  /** Whether what stands here may or may not be compiled. */
  get isOpen(): boolean {
    return this.stack.includes('open');
  }

  /**
   * Notes the directive that the lexer stands on.
   *
   * @returns undefined where it is none of these; else the offset to go on from: that of the next directive that
   *   counts, where the text between is switched off
   */
  note({ text, start, end }: CLexer): number | undefined {
    const word = directiveWord.exec(text.slice(start, Math.min(end, start + 40)))?.[1];
    switch (word) {
      case 'if':
      case 'ifdef':
      case 'ifndef':
        return this.open(word === 'if' ? text.slice(start, end) : '', text, start, end);
      case 'else':
      case 'elif':
      case 'elifdef':
      case 'elifndef':
        return this.turn(word, text, end);
      case 'endif':
        this.stack.pop();
        return end;
      default:
        return undefined;
    }
  }

  private open(condition: string, text: string, start: number, end: number): number {
    const constant = /^#\s*if\s+([01])\s*(?:\/[/*].*)?$/s.exec(condition)?.[1] as '0' | '1' | undefined;
    if (this.stack.length >= 256) refuseAt(text, start, 'a deeper #if', '#if within #if at most 256 deep');
    this.stack.push(constant ?? 'open');
    return constant === '0' ? this.pass(text, end) : end;
  }

  private turn(word: string, text: string, end: number): number {
    const now = this.stack.pop() ?? 'open';
    if (now === '1') {
      this.stack.push('1');
      return this.pass(text, end);
    }
    this.stack.push(now === '0' && word === 'else' ? '1' : 'open');
    return end;
  }

  /** From here line by line to the `#else` or `#endif` of this depth. */
  private pass(text: string, from: number): number {
    const lines = /^[ \t]*#[ \t]*(if|ifdef|ifndef|else|elif\w*|endif)\b/gm;
    lines.lastIndex = from;
    let depth = 0;
    for (let line = lines.exec(text); line; line = lines.exec(text)) {
      if (line[1].startsWith('if')) depth += 1;
      else if (depth === 0) return line.index;
      else if (line[1] === 'endif') depth -= 1;
    }
    return text.length;
  }
}

const directiveWord = /^#\s*([a-z]+)/;
