import Papa from 'papaparse';
import { parseQuantity } from '../../../../../shared/quantities/index.ts';

/** What commas in the text stand for. Only who wrote it knows, where it can be read in two ways. */
export type Comma = 'decimal' | 'thousands' | 'separator';

export interface LevelFault {
  /** Line of the text, from 1. */
  readonly line: number;
  readonly value: string;
  readonly allowed: string;
}

export type LevelsReading =
  | { readonly kind: 'nothing' }
  /** Voltages by code. */
  | { readonly kind: 'levels'; readonly volts: readonly number[] }
  /** The first text that can be read in two ways, and those. */
  | {
      readonly kind: 'ask';
      readonly text: string;
      readonly readings: readonly { comma: Comma; says: string }[];
    }
  | { readonly kind: 'faults'; readonly faults: readonly [LevelFault, ...LevelFault[]] };

interface Row {
  readonly line: number;
  readonly cells: readonly string[];
}

/** More faults of a text than these are of no use to its reader. */
const mostFaults = 5;

/**
 * Reads voltages: one a line or many, in order of their codes, or lines of a code and its voltage. Cells are parted by
 * semicolons, tabs, commas or blanks, may carry a unit (`19.5 mV`), and may stand below a line of headings.
 */
export function readLevels(text: string, comma?: Comma): LevelsReading {
  if (text.trim() === '') return { kind: 'nothing' };
  const delimiter = delimiterOf(text, comma);
  if (delimiter === null) {
    const [found] = /\d+,\d+/.exec(text) ?? [''];
    const [whole, part] = found.split(',');
    return {
      kind: 'ask',
      text: found,
      readings: [
        { comma: 'decimal', says: `a decimal comma: ${whole}.${part}` },
        { comma: 'separator', says: `two numbers: ${whole} and ${part}` },
      ],
    };
  }
  const rows = withoutHeadings(rowsOf(text, delimiter), comma);
  const open = rows.flatMap(({ cells }) => cells).find((cell) => volts(cell, comma).kind === 'ask');
  if (open !== undefined) {
    return {
      kind: 'ask',
      text: open,
      readings: [
        { comma: 'decimal', says: `a decimal comma: ${open.replace(',', '.')}` },
        { comma: 'thousands', says: `thousands: ${open.replaceAll(',', '')}` },
      ],
    };
  }
  return rows.length > 1 && rows.every(({ cells }) => cells.length === 2)
    ? byCode(rows, comma)
    : inOrder(rows, comma);
}

/** What parts the cells; `null` where a comma may part them or stand in a number. */
function delimiterOf(text: string, comma?: Comma): string | null {
  if (text.includes(';')) return ';';
  if (text.includes('\t')) return '\t';
  if (!text.includes(',')) return ' ';
  if (comma !== undefined) return comma === 'separator' ? ',' : ' ';
  const isEachOne = text.split('\n').every((line) => (line.match(/,/g)?.length ?? 0) <= 1);
  return isEachOne && /\d,\d/.test(text) && !/\d\.\d/.test(text) ? null : ',';
}

function rowsOf(text: string, delimiter: string): Row[] {
  // A voltage and its unit stay together where blanks part the cells.
  const tidy = delimiter === ' ' ? text.replace(/(\d) +(?=[pnuµmk]?V\b)/g, '$1').replace(/ +/g, ' ') : text;
  const rows: Row[] = [];
  let line = 0;
  Papa.parse<string[]>(tidy, {
    delimiter,
    step({ data }) {
      line += 1;
      const cells = data.map((cell) => cell.trim()).filter((cell) => cell !== '');
      if (cells.length > 0) rows.push({ line, cells });
    },
  });
  return rows;
}

function withoutHeadings(rows: readonly Row[], comma?: Comma): readonly Row[] {
  const isHeading =
    rows.length > 1 && rows[0].cells.every((cell) => volts(cell, comma).kind === 'unreadable');
  return isHeading ? rows.slice(1) : rows;
}

function volts(cell: string, comma?: Comma) {
  const plain =
    comma === 'decimal' ? cell.replace(',', '.') : comma === 'thousands' ? cell.replaceAll(',', '') : cell;
  return parseQuantity(plain, 'V');
}

function inOrder(rows: readonly Row[], comma?: Comma): LevelsReading {
  const read = new Collected();
  for (const { line, cells } of rows) for (const cell of cells) read.take(line, cell, comma);
  return read.answer();
}

/** Lines of a code and its voltage, in any order. */
function byCode(rows: readonly Row[], comma?: Comma): LevelsReading {
  const read = new Collected();
  const sorted: number[] = [];
  for (const { line, cells } of rows) {
    const [code, cell] = cells;
    const isCode = /^\d+$/.test(code) && Number(code) < rows.length && !(Number(code) in sorted);
    if (!isCode) read.refuse(line, code, `each code from 0 to ${rows.length - 1} once`);
    const value = read.take(line, cell, comma);
    if (isCode && value !== undefined) sorted[Number(code)] = value;
  }
  return read.answer(sorted);
}

/** Voltages taken so far, and the first faults. */
class Collected {
  private readonly values: number[] = [];
  private readonly faults: LevelFault[] = [];

  take(line: number, cell: string, comma?: Comma): number | undefined {
    const reading = volts(cell, comma);
    if (reading.kind !== 'number') {
      this.refuse(line, cell, 'a voltage, as in 0.0195 or 19.5 mV');
      return undefined;
    }
    this.values.push(reading.value);
    return reading.value;
  }

  refuse(line: number, value: string, allowed: string): void {
    if (this.faults.length < mostFaults) this.faults.push({ line, value, allowed });
  }

  answer(values: readonly number[] = this.values): LevelsReading {
    const [first, ...others] = this.faults;
    return first === undefined
      ? { kind: 'levels', volts: values }
      : { kind: 'faults', faults: [first, ...others] };
  }
}
