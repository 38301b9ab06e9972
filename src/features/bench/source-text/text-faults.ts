import { ensureSyntaxTree } from '@codemirror/language';
import type { Diagnostic } from '@codemirror/lint';
import type { EditorView } from '@codemirror/view';
import type { Problem } from '../../../../shared/contract/index.ts';
import { sayHere } from '../problems/field-problem.tsx';
import { nameOfField } from '../problems/field-names.ts';
import { placeOfPath, type TextRange } from './json-place.ts';
import type { TextReading } from './read-text.ts';

/** Something wrong with the text, at a place in it. */
export interface TextFault extends TextRange {
  /** From 1. */
  readonly line: number;
  readonly column: number;
  readonly message: string;
}

/** Longest time that reading a text's syntax may take on the way, in milliseconds. */
const parseMs = 500;

/**
 * What is wrong with a text, where in it.
 *
 * @param built what the engine found wrong with the definition that the text stands for
 */
export function faultsOf(view: EditorView, reading: TextReading, built: readonly Problem[]): TextFault[] {
  const { doc } = view.state;
  if (reading.kind === 'no JSON') {
    const { line, column, found, allowed } = reading.fault;
    const from = Math.min(doc.length, doc.line(line).from + column - 1);
    return [
      {
        from,
        to: Math.min(doc.length, from + 1),
        line,
        column,
        message: `${found} is not JSON here. Allowed: ${allowed}.`,
      },
    ];
  }
  const problems = reading.kind === 'refused' ? reading.problems : built;
  if (problems.length === 0) return [];
  const tree = ensureSyntaxTree(view.state, doc.length, parseMs);
  const text = doc.toString();
  return problems
    .map((problem): TextFault => {
      const range = tree === null ? { from: 0, to: 0 } : placeOfPath(tree, text, problem.path);
      const line = doc.lineAt(range.from);
      return {
        ...range,
        line: line.number,
        column: range.from - line.from + 1,
        message: `${nameOfField(problem.path)}: ${sayHere(problem)}`,
      };
    })
    .sort((one, other) => one.from - other.from);
}

export function diagnosticOf({ from, to, message }: TextFault): Diagnostic {
  return { from, to, message, severity: 'error' };
}
