import { showValue, type Problem } from '../contract/index.ts';
import { curveProblems, type ResponsePoint } from '../listening/device-response.ts';
import { faultAt, readCsv, type CsvOutcome, type CsvQuestion, type CsvReading } from './csv/read-csv.ts';
import { refuseAt, refuseFile } from './refuse.ts';

export type ResponseOutcome =
  | { readonly kind: 'read'; readonly points: readonly ResponsePoint[] }
  /** Whether a lone comma is the decimal sign. The answer is added to the reading, and the text read again. */
  | { readonly kind: 'ask'; readonly question: Extract<CsvQuestion, { about: 'decimal' }> };

const twoColumns = 'two columns: a frequency in Hz, and a level in dB';
const hertzOf: Readonly<Record<string, number>> = { hz: 1, khz: 1e3, mhz: 1e6 };

/**
 * Reads a response curve from two columns, frequency and level, as `readCsv` reads one: with or without a heading,
 * in either decimal sign. A unit stands in the heading (`f in kHz`) or behind each number; without one it is Hz and dB.
 * Headings that name dB first and Hz second change the columns' order.
 *
 * @returns a curve without problems; or a question, where a comma may be the decimal sign
 * @throws {Refusal} by line and column where a cell, a unit or the order of frequencies is not allowed
 */
export function readResponseCsv(text: string, reading: CsvReading = {}): ResponseOutcome {
  const { plain, unitHz } = withoutUnits(text);
  const sheet = sheetOf(plain, reading);
  const width = sheet.columns.length;
  if (width !== 2) refuseFile(`${width} ${width === 1 ? 'column' : 'columns'}`, twoColumns);
  const { delimiter, hasHeader } = sheet;
  const headings = hasHeader ? sheet.columns.map(({ name }) => name) : ['', ''];
  const isSwapped = /\bdb/i.test(headings[0]) && /hz\b|freq/i.test(headings[1]);
  const [hzColumn, dbColumn] = isSwapped ? [1, 0] : [0, 1];

  const agreed = { ...reading, delimiter, hasHeader };
  const frequencies = readCsv(plain, { ...agreed, column: hzColumn });
  if (frequencies.kind === 'ask') return ask(frequencies);
  const levels = readCsv(plain, { ...agreed, column: dbColumn });
  if (levels.kind === 'ask') return ask(levels);
  const rowOf = (index: number) => index + (hasHeader ? 1 : 0);
  const count = Math.min(frequencies.values.length, levels.values.length);
  if (frequencies.values.length !== levels.values.length) {
    const column = frequencies.values.length === count ? hzColumn : dbColumn;
    throw faultAt(plain, delimiter, rowOf(count), column, 'an empty cell');
  }

  const scale = unitHz ?? hertzOf[/\b([kM]?Hz)\b/i.exec(headings[hzColumn])?.[1].toLowerCase() ?? 'hz'];
  // Rounded to what a double keeps of decimals: 0.3 kHz is 300 Hz.
  const points = frequencies.values.map((value, index) => ({
    hz: Number((value * scale).toPrecision(12)),
    db: levels.values[index],
  }));
  const [problem] = curveProblems(points) as (Problem | undefined)[];
  if (problem !== undefined) {
    const at = /^points\[(\d+)\]\.(hz|db)$/.exec(problem.path);
    if (at === null) refuseFile(problem.value, problem.allowed);
    const column = at[2] === 'hz' ? hzColumn : dbColumn;
    throw faultAt(plain, delimiter, rowOf(Number(at[1])), column, problem.value, problem.allowed);
  }
  return { kind: 'read', points };
}

/** The text taken apart. Two columns are what there must be, so that a comma between two whole numbers parts them. */
function sheetOf(plain: string, reading: CsvReading): CsvOutcome {
  const first = readCsv(plain, { ...reading, column: 0 });
  if (first.kind === 'read' || first.question.about !== 'decimal') return first;
  const asPairs = first.question.answers.find((answer) => answer.reading.delimiter === ',');
  return first.columns.length === 2 && reading.delimiter === undefined && asPairs !== undefined
    ? readCsv(plain, { ...reading, delimiter: first.delimiter, column: 0 })
    : first;
}

/** The question, its answers good for both columns. */
function ask({ question }: Extract<CsvOutcome, { kind: 'ask' }>): ResponseOutcome {
  if (question.about !== 'decimal') throw new Error('One column was asked for.');
  const answers = question.answers.map(({ reading: { column: _one, ...reading }, shown }) => ({
    reading,
    shown,
  }));
  return { kind: 'ask', question: { ...question, answers } };
}

/**
 * The text with blanks in place of units behind numbers, so that places stay right.
 *
 * @returns `unitHz`: hertz to the unit of frequency, where one stands behind numbers
 * @throws {Refusal} where frequencies have more than one unit
 */
function withoutUnits(text: string): { plain: string; unitHz: number | undefined } {
  let unit: string | undefined;
  const plain = text.replace(
    /(\d[ \t\u00a0]*)(k?Hz|MHz|dB)\b/gi,
    (all, number: string, name: string, at: number) => {
      const told = name.toLowerCase();
      // `mHz` is a thousandth of a hertz: no unit of a curve, so it stays and is refused as it stands.
      if (told === 'mhz' && name.startsWith('m')) return all;
      if (told !== 'db') {
        unit ??= told;
        if (unit !== told)
          refuseAt(text, at + number.length, showValue(name), 'one unit for all frequencies');
      }
      return number + ' '.repeat(name.length);
    },
  );
  return { plain, unitHz: unit === undefined ? undefined : hertzOf[unit] };
}
