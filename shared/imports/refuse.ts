import { Refusal, showValue } from '../contract/index.ts';

/** Where something stands in a text, both counted from 1; a column is a UTF-16 unit. */
export interface Place {
  readonly line: number;
  readonly column: number;
}

/** Where the lines of the text asked about last begin: a file with many arrays is asked about often. */
let known = { text: '', starts: [0] };

/** Lines end with LF, CR LF or CR. */
export function placeOf(text: string, offset: number): Place {
  if (known.text !== text) known = { text, starts: lineStartsOf(text) };
  const { starts } = known;
  let line = 0;
  let beyond = starts.length;
  while (beyond - line > 1) {
    const middle = (line + beyond) >> 1;
    if (starts[middle] <= offset) line = middle;
    else beyond = middle;
  }
  return { line: line + 1, column: offset - starts[line] + 1 };
}

function lineStartsOf(text: string): number[] {
  const starts = [0];
  for (let i = 0; i < text.length; i += 1) {
    const unit = text.charCodeAt(i);
    if (unit === 10 || (unit === 13 && text.charCodeAt(i + 1) !== 10)) starts.push(i + 1);
  }
  return starts;
}

export const sayPlace = ({ line, column }: Place) => `line ${line}, column ${column}`;

/**
 * Refuses what stands at `offset` of a text.
 *
 * @param value what was found, already fit for reading
 * @throws {Refusal} whose path is the line and the column
 */
export function refuseAt(text: string, offset: number, value: string, allowed: string): never {
  throw new Refusal({ path: sayPlace(placeOf(text, offset)), value, allowed });
}

/** @throws {Refusal} of a file as a whole */
export function refuseFile(value: string, allowed: string): never {
  throw new Refusal({ path: 'file', value, allowed });
}

/** A piece of the text for a message, in quotes and shortened. */
export const quoted = (text: string, start: number, end: number) => showValue(text.slice(start, end));
