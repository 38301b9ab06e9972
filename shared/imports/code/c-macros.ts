import { CLexer } from './c-lexer.ts';

export type Macro =
  | { readonly kind: 'text'; readonly from: number; readonly to: number; readonly isSure: boolean }
  | { readonly kind: 'function' }
  | { readonly kind: 'two-values' };

/** Macros as they stand at one place of the text, and the numbers they were found to stand for there. */
export class Macros {
  private readonly known = new Map<string, Macro>();
  /** A table may name a macro a hundred thousand times. */
  readonly numbers = new Map<string, number>();
  /** Those that are being looked into just now. */
  readonly open = new Set<string>();

  get(name: string): Macro | undefined {
    return this.known.get(name);
  }

  /**
   * Notes what a `#define` or `#undef` says; other directives say nothing about macros.
   *
   * @param isConditional whether it may or may not be compiled: two values are then none
   */
  note({ text, start, end }: CLexer, isConditional: boolean): void {
    const body = new CLexer(text, start + 1, end, true);
    if (body.next() !== 'word') return;
    const { word } = body;
    if ((word !== 'define' && word !== 'undef') || body.next() !== 'word') return;
    const name = body.word;
    this.numbers.clear();
    if (word === 'undef') this.known.delete(name);
    else this.known.set(name, this.defined(name, text, body.end, end, isConditional));
  }

  private defined(name: string, text: string, from: number, to: number, isConditional: boolean): Macro {
    if (text[from] === '(' && from < to) return { kind: 'function' };
    const before = this.known.get(name);
    const isOpen =
      isConditional || before?.kind === 'two-values' || (before?.kind === 'text' && !before.isSure);
    const isSame =
      before?.kind === 'text' && text.slice(before.from, before.to).trim() === text.slice(from, to).trim();
    if (before && !isSame && isOpen) return { kind: 'two-values' };
    return { kind: 'text', from, to, isSure: !isConditional };
  }
}
