import Papa from 'papaparse';
import { limits, Refusal, showValue } from '../../contract/index.ts';
import { placeOf, refuseAt, refuseFile, sayPlace } from '../refuse.ts';
import { readCell, type DecimalSign } from './read-cell.ts';

export const delimiters = [',', ';', '\t', '|', ' '] as const;
export type Delimiter = (typeof delimiters)[number];

/** How a file of columns is to be read; what is left out is found, or asked about where two readings are fair. */
export interface CsvReading {
  readonly delimiter?: Delimiter | undefined;
  readonly decimal?: DecimalSign | undefined;
  readonly hasHeader?: boolean | undefined;
  /** From 0. */
  readonly column?: number | undefined;
}

export interface CsvColumn {
  /** Its heading, or `column 2` where it has none. */
  readonly name: string;
  /** Its first few cells below the heading, as they stand there. */
  readonly firstCells: readonly string[];
  /** Whether its first cells are numbers. */
  readonly isNumeric: boolean;
}

/** What is the same in both outcomes: the file as it was taken apart. */
export interface CsvSheet {
  readonly delimiter: Delimiter;
  readonly hasHeader: boolean;
  readonly columns: readonly CsvColumn[];
  readonly rowCount: number;
}

export type CsvOutcome =
  | (CsvSheet & {
      readonly kind: 'read';
      readonly column: number;
      readonly decimal: DecimalSign;
      readonly values: readonly number[];
    })
  | (CsvSheet & { readonly kind: 'ask'; readonly question: CsvQuestion });

/** What only the writer knows. Each answer is added to the reading, and the file read again. */
export type CsvQuestion =
  | {
      readonly about: 'decimal';
      readonly cell: string;
      readonly answers: readonly { readonly reading: CsvReading; readonly shown: string }[];
    }
  | {
      readonly about: 'column';
      readonly answers: readonly { readonly reading: CsvReading; readonly shown: string }[];
    };

const columnsAtMost = 256;
const shownCells = 5;

/**
 * Reads one column of numbers from comma-, semicolon- or tab-separated text (RFC 4180, through Papa Parse).
 *
 * @returns the numbers; or a question, where a comma may be the decimal sign or several columns hold numbers
 * @throws {Refusal} where a cell is no number, with its line and column in the text
 */
export function readCsv(text: string, reading: CsvReading = {}): CsvOutcome {
  if (text.trim() === '') refuseFile('an empty text', 'a column of at least 2 numbers');
  const delimiter = reading.delimiter ?? findDelimiter(text);
  const rows = rowsOf(text, delimiter);
  const width = rows.reduce((most, row) => Math.max(most, row.length), 0);
  if (width > columnsAtMost) refuseFile(`${width} columns`, `at most ${columnsAtMost}`);

  const hasHeader = reading.hasHeader ?? looksLikeHeader(rows);
  const body = hasHeader ? rows.slice(1) : rows;
  const columns = Array.from({ length: width }, (_, index): CsvColumn => {
    const cells = body.slice(0, shownCells).map((row) => cellOf(row, index));
    const heading = hasHeader ? cellOf(rows[0], index) : '';
    return {
      name: heading === '' ? `column ${index + 1}` : heading.slice(0, 80),
      firstCells: cells.map((cell) => cell.slice(0, 40)),
      isNumeric:
        cells.some((cell) => cell !== '') &&
        cells.every((cell) => cell === '' || readCell(cell).kind !== 'text'),
    };
  });
  const sheet: CsvSheet = { delimiter, hasHeader, columns, rowCount: body.length };

  const commas =
    reading.decimal === undefined && reading.delimiter === undefined
      ? askedAsPairs(rows, delimiter)
      : undefined;
  if (commas) return { ...sheet, kind: 'ask', question: commas };
  const column = reading.column ?? onlyColumn(columns);
  if (column === undefined)
    return { ...sheet, kind: 'ask', question: askedForColumn(columns, { ...reading, delimiter, hasHeader }) };
  if (!Number.isInteger(column) || column < 0 || column >= width) {
    throw new Refusal({ path: 'column', value: String(column + 1), allowed: `1 to ${width}` });
  }
  return readColumn(text, { ...reading, delimiter, hasHeader, column }, sheet, rows);
}

const cellOf = (row: readonly string[], index: number) => ((row[index] as string | undefined) ?? '').trim();

function rowsOf(text: string, delimiter: Delimiter): string[][] {
  const { data, errors } = Papa.parse<string[]>(delimiter === ' ' ? singleSpaced(text) : text, {
    delimiter,
    skipEmptyLines: 'greedy',
  });
  const fault = errors.find(({ type }) => type === 'Quotes');
  if (fault)
    refuseAt(
      text,
      Math.min(text.length, fault.index ?? 0),
      'a quote that is never closed',
      'quotes in pairs',
    );
  if (data.length === 0) refuseFile('a text without cells', 'a column of at least 2 numbers');
  return data;
}

/** Columns set apart by any number of blanks, kept as long as they were so that places stay right. */
const singleSpaced = (text: string) =>
  text
    .replaceAll('\t', ' ')
    .replace(/^ +| +$/gm, '')
    .replace(/ {2,}/g, ' ');

/** The one that parts most lines of the first hundred alike; a comma where none does. */
function findDelimiter(text: string): Delimiter {
  const lines = text
    .slice(0, 65_536)
    .split(/\r\n|\r|\n/)
    .filter((line) => line.trim() !== '')
    .slice(0, 100);
  for (const delimiter of ['\t', ';', '|'] as const) {
    if (lines.every((line) => line.includes(delimiter))) return delimiter;
  }
  if (lines.some((line) => line.includes(','))) {
    return lines.every((line) => / +\S/.test(line.trim()) && !/,\s/.test(line)) ? ' ' : ',';
  }
  return lines.every((line) => /\S\s+\S/.test(line)) && lines.length > 0 ? ' ' : ',';
}

/** The first row is a heading where a cell of it is a word and the one below is a number. */
function looksLikeHeader(rows: readonly (readonly string[])[]): boolean {
  const second = rows[1] as readonly string[] | undefined;
  if (!second) return false;
  return rows[0].some((cell, index) => {
    const below = cellOf(second, index);
    return (
      readCell(cell.trim()).kind === 'text' &&
      cell.trim() !== '' &&
      below !== '' &&
      readCell(below).kind !== 'text'
    );
  });
}

function onlyColumn(columns: readonly CsvColumn[]): number | undefined {
  const numeric = columns.flatMap(({ isNumeric }, index) => (isNumeric ? [index] : []));
  if (numeric.length === 1) return numeric[0];
  return columns.length === 1 || numeric.length === 0 ? 0 : undefined;
}

function askedForColumn(columns: readonly CsvColumn[], reading: CsvReading): CsvQuestion {
  const answers = columns.flatMap(({ name, firstCells, isNumeric }, column) =>
    isNumeric ? [{ reading: { ...reading, column }, shown: `${name}: ${firstCells.join('  ')}` }] : [],
  );
  return { about: 'column', answers };
}

/**
 * `0,5` on each line is one column with decimal commas or two columns of whole numbers. Asked about where every line
 * holds one whole number or two, the second of digits alone.
 */
function askedAsPairs(rows: readonly (readonly string[])[], delimiter: Delimiter): CsvQuestion | undefined {
  if (delimiter !== ',') return undefined;
  const isWhole = (row: readonly string[]) => /^\s*[-+]?\d+\s*$/.test(row[0]);
  const isPair = (row: readonly string[]) => row.length === 2 && isWhole(row) && /^\d+\s*$/.test(row[1]);
  const body = rows.length > 1 && !isWhole(rows[0]) ? rows.slice(1) : rows;
  const pair = body.find(isPair);
  if (!pair || !body.every((row) => isPair(row) || (row.length === 1 && isWhole(row)))) return undefined;
  const cell = pair.join(',').trim();
  return {
    about: 'decimal',
    cell,
    answers: [
      {
        reading: { delimiter: ';', decimal: 'comma' },
        shown: `${cell.replace(',', '.')}: one column, decimal comma`,
      },
      { reading: { delimiter: ',', decimal: 'point' }, shown: `${cell.replace(',', ' and ')}: two columns` },
    ],
  };
}

function readColumn(
  text: string,
  reading: CsvReading & { delimiter: Delimiter; hasHeader: boolean; column: number },
  sheet: CsvSheet,
  rows: readonly (readonly string[])[],
): CsvOutcome {
  const { column, hasHeader, decimal } = reading;
  const values: number[] = [];
  let lone: { cell: string; grouped: number; asDecimal: number } | undefined;
  let sign = decimal;
  let last = rows.length;
  while (last > 0 && cellOf(rows[last - 1], column) === '') last -= 1;
  for (let row = hasHeader ? 1 : 0; row < last; row += 1) {
    const cell = cellOf(rows[row], column);
    const read = readCell(cell, sign);
    if (read.kind === 'text') {
      throw faultAt(text, reading.delimiter, row, column, cell === '' ? 'an empty cell' : showValue(cell));
    }
    if (read.kind === 'ask') lone ??= { cell, grouped: read.grouped, asDecimal: read.decimal };
    else if (read.shows) sign ??= read.shows;
    values.push(read.kind === 'ask' ? read.decimal : read.value);
  }
  if (lone) {
    const answer = (chosen: DecimalSign, value: number) => ({
      reading: { ...reading, decimal: chosen },
      shown: `${lone.cell} is ${value}`,
    });
    const answers = [answer('comma', lone.asDecimal), answer('point', lone.grouped)];
    return { ...sheet, kind: 'ask', question: { about: 'decimal', cell: lone.cell, answers } };
  }
  if (values.length < limits.samples.min)
    refuseFile(`${values.length} numbers`, `at least ${limits.samples.min}`);
  return { ...sheet, kind: 'read', column, decimal: sign ?? 'point', values };
}

/**
 * Refuses a cell by its place in the text: looked for only now, by going through the file once more.
 *
 * @param row from 0, of those that hold anything; the heading is one
 */
export function faultAt(
  text: string,
  delimiter: Delimiter,
  row: number,
  column: number,
  value: string,
  allowed = 'a number',
): Refusal {
  let at = 0;
  let seen = -1;
  Papa.parse<string[]>(text, {
    delimiter,
    step: ({ data, meta }, parser) => {
      const isEmpty = data.every((cell) => cell.trim() === '');
      if (!isEmpty) seen += 1;
      if (seen === row) parser.abort();
      else at = meta.cursor;
    },
  });
  const line = text.slice(at, at + 100_000);
  const lead = /^ */.exec(line)?.[0].length ?? 0;
  const cells = line.slice(lead).split(delimiter === ' ' ? /[ \t]+/ : delimiter);
  const before = cells.slice(0, column).reduce((sum, cell) => sum + cell.length + 1, 0);
  const blanks = /^ */.exec((cells[column] as string | undefined) ?? '')?.[0].length ?? 0;
  const place = sayPlace(placeOf(text, Math.min(text.length, at + lead + before + blanks)));
  return new Refusal({ path: place, value, allowed });
}
