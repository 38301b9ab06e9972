import { Refusal, showValue } from '../../contract/index.ts';
import { importLimits } from '../limits.ts';
import { placeOf, refuseAt } from '../refuse.ts';
import { statementsOf, type Operand, type Statement } from './assembly-lines.ts';
import { asStored, rangeOfWord, type CodeArray, type FoundArrays, type RefusedArray } from './code-array.ts';
import { assemblyNumber } from './literals.ts';

/** Bits of one word by directive. `.word` has 16 on some machines, 32 on others: 16 unless a number needs more. */
const widths: Readonly<Record<string, number>> = {
  byte: 8,
  db: 8,
  word: 16,
  dw: 16,
  short: 16,
  hword: 16,
  '2byte': 16,
  long: 32,
  int: 32,
  '4byte': 32,
};

/** Directives that lay down data we do not read. */
const otherData =
  /^(?:ascii|asciz|string|string8|string16|fill|space|skip|zero|rept|irp|irpc|macro|incbin|include|quad|8byte|octa|float|single|double|dc|ds|dcb|dcw|dcd|res\w?)$/;
/** Directives that say nothing about what stands where. */
const silent =
  /^(?:global|globl|type|size|section|data|text|cseg|dseg|pushsection|popsection|set|equ|equiv|=)$/;

/** Whether the text reads as assembly source with data in it. */
export const looksLikeAssembly = (text: string) => dottedData.test(text) || bareData.test(text);

// Written so that no two parts can share out a stretch of blanks: a line may be a megabyte of them.
const dottedData =
  /^[ \t]*(?:[A-Za-z_.$][\w.$]*[ \t]*:[ \t]*)?\.(?:byte|db|word|dw|short|hword|2byte|long|int|4byte)\b/im;
const bareData = /^(?:[ \t]*[A-Za-z_.$][\w.$]*:?)?[ \t]+(?:db|dw)[ \t]+[$\d'-]/im;

interface Run {
  readonly name: string;
  readonly at: number;
  directive: string;
  readonly given: number[];
  /** Where the widest number stands, should it be wider than 16 bits. */
  wideAt: number | undefined;
}

/**
 * Finds the runs of data directives in assembly source, each from its label to the next label or instruction.
 *
 * @throws {Refusal} where there is none
 */
export function readAssemblyArrays(text: string): FoundArrays {
  const arrays: CodeArray[] = [];
  const refused: RefusedArray[] = [];
  const symbols = new Map<string, number | undefined>();
  let run: Run | undefined;
  let isBroken = false;

  const begin = (name: string, at: number): Run => {
    if (arrays.length + refused.length >= importLimits.arrays) {
      refuseAt(text, at, 'one more array', `at most ${importLimits.arrays} arrays in a file`);
    }
    return { name, at, directive: '', given: [], wideAt: undefined };
  };
  const end = () => {
    if (run && run.given.length > 0 && !isBroken) arrays.push(arrayOf(text, run));
    run = undefined;
    isBroken = false;
  };
  const attempt = (work: () => void) => {
    try {
      work();
    } catch (error) {
      if (!(error instanceof Refusal) || !run) throw error;
      if (!isBroken)
        refused.push({ name: run.name, line: placeOf(text, run.at).line, problem: error.problems[0] });
      isBroken = true;
    }
  };

  for (const statement of statementsOf(text)) {
    const { labels, operation, at, operands } = statement;
    if (/^(?:equ|set|equiv|=)$/.test(operation)) {
      noteSymbol(statement, symbols);
      continue;
    }
    const label = labels.at(-1);
    if (label) {
      end();
      run = begin(label.text, label.at);
    }
    if (operation === '' || silent.test(operation)) continue;
    const width = widths[operation] as number | undefined;
    if (width !== undefined) {
      run ??= begin('', at);
      const open = run;
      attempt(() => addWords(text, open, operation, at, operands, symbols));
    } else if (otherData.test(operation) && run && run.given.length > 0) {
      attempt(() =>
        refuseAt(
          text,
          at,
          showValue(operation),
          'numbers in .byte, .db, .word, .short, .hword, .2byte, .long',
        ),
      );
    } else end();
  }
  end();
  if (arrays.length + refused.length === 0) {
    refuseAt(
      text,
      0,
      'a text without data directives',
      'numbers in .byte, .db, .word, .short, .hword or .2byte',
    );
  }
  return { arrays, refused };
}

function noteSymbol({ labels, operands }: Statement, symbols: Map<string, number | undefined>): void {
  const [name, valueText] = labels.length > 0 ? [labels[0].text, operands[0]?.text] : symbolIn(operands);
  if (name === undefined || valueText === undefined) return;
  const read = signedNumber(valueText, symbols);
  symbols.set(name, typeof read === 'number' ? read : undefined);
}

/** `.equ name, value` or `.equ name = value`. */
function symbolIn(operands: readonly Operand[]): [string | undefined, string | undefined] {
  if (operands.length > 1) return [operands[0].text, operands[1].text];
  const parts = /^([\w.$]+)\s*=\s*(.+)$/.exec(operands[0]?.text ?? '');
  return [parts?.[1], parts?.[2]];
}

function addWords(
  text: string,
  run: Run,
  directive: string,
  at: number,
  operands: readonly Operand[],
  symbols: ReadonlyMap<string, number | undefined>,
): void {
  if (run.directive !== '' && widths[run.directive] !== widths[directive]) {
    refuseAt(text, at, `.${directive} behind .${run.directive}`, 'words of one width under a label');
  }
  if (operands.length === 0) refuseAt(text, at, `.${directive} without numbers`, 'at least 1 number');
  run.directive = directive;
  const isWord = directive === 'word';
  const bits = isWord ? 32 : widths[directive];
  const { min, max } = rangeOfWord(bits);
  const narrow = rangeOfWord(16);
  for (const operand of operands) {
    const value = signedNumber(operand.text, symbols);
    if (typeof value !== 'number') {
      refuseAt(
        text,
        operand.at,
        `${showValue(operand.text)}, ${value.fault},`,
        'a plain number, or a symbol of one',
      );
    }
    if (value < min || value > max) {
      refuseAt(text, operand.at, `${value}`, `${min} to ${max}, as .${directive} holds`);
    }
    if (isWord && (value < narrow.min || value > narrow.max)) run.wideAt ??= operand.at;
    run.given.push(value);
  }
}

function signedNumber(
  operand: string,
  symbols: ReadonlyMap<string, number | undefined>,
): number | { readonly fault: string } {
  // As nearly all operands are: a short decimal number.
  if (/^[1-9]\d{0,8}$/.test(operand)) return Number(operand);
  const parts = /^([-+]?)\s*(.*)$/s.exec(operand);
  const [sign, digits] = [parts?.[1] === '-' ? -1 : 1, parts?.[2] ?? ''];
  if (digits === '') return { fault: 'nothing at all' };
  if (/^[A-Za-z_.][\w.$]*$/.test(digits)) {
    const value = symbols.get(digits);
    if (value === undefined) return { fault: 'a symbol without a plain number above' };
    return value === 0 ? 0 : sign * value;
  }
  const read = assemblyNumber(digits);
  if ('fault' in read) return read;
  return read.value === 0 ? 0 : sign * read.value;
}

function arrayOf(text: string, { name, at, directive, given, wideAt }: Run): CodeArray {
  const wordBits = directive === 'word' && wideAt !== undefined ? 32 : widths[directive];
  const { values, isSigned, notes } = asStored(given, { wordBits, isSigned: undefined });
  return { name, line: placeOf(text, at).line, typeName: `.${directive}`, wordBits, isSigned, values, notes };
}
