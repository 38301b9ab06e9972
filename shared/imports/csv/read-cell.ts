import { parseQuantity } from '../../quantities/index.ts';

export type DecimalSign = 'point' | 'comma';

/** What one cell says. */
export type CellReading =
  | { readonly kind: 'number'; readonly value: number; readonly shows: DecimalSign | undefined }
  /** A lone comma: the decimal sign, or set between thousands. */
  | { readonly kind: 'ask'; readonly decimal: number; readonly grouped: number }
  | { readonly kind: 'text' };

const plain = /^[-+]?(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d+)?$/;

const minus = 0x2212;
const enDash = 0x2013;

/** A number of a cell, in either decimal sign where one is agreed on. Units are text: a column has one, in its heading. */
export function readCell(cell: string, decimal?: DecimalSign): CellReading {
  const first = cell.charCodeAt(0);
  const text = first === minus || first === enDash ? `-${cell.slice(1)}` : cell;
  if (plain.test(text) && !(decimal === 'comma' && /^[-+]?\d{1,3}(?:\.\d{3})+$/.test(text))) {
    return numberOf(Number(text), text.includes('.') ? 'point' : undefined);
  }
  if (text === '' || !/^[-+]?[\d., '_\u00a0\u2009\u202f]*\d[\d., '_]*(?:[eE][-+]?\d+)?$/u.test(text))
    return { kind: 'text' };
  if (decimal !== undefined && !/[ '_]/.test(text)) return readAgreed(text, decimal);
  const read = parseQuantity(text);
  if (read.kind === 'number') return numberOf(read.value, undefined);
  // The decimal reading comes first (shared/quantities).
  if (read.kind === 'ask')
    return { kind: 'ask', decimal: read.readings[0].value, grouped: read.readings[1].value };
  return { kind: 'text' };
}

/** With the decimal sign known, the other one sets thousands apart, in threes. */
function readAgreed(text: string, decimal: DecimalSign): CellReading {
  const isComma = decimal === 'comma';
  const grouped = isComma
    ? /^[-+]?[1-9]\d{0,2}(?:\.\d{3})+(?:,\d*)?$/
    : /^[-+]?[1-9]\d{0,2}(?:,\d{3})+(?:\.\d*)?$/;
  const bare = grouped.test(text) ? text.replaceAll(isComma ? '.' : ',', '') : text;
  const number = isComma ? bare.replace(',', '.') : bare;
  return plain.test(number) ? numberOf(Number(number), decimal) : { kind: 'text' };
}

const numberOf = (value: number, shows: DecimalSign | undefined): CellReading =>
  Number.isFinite(value) ? { kind: 'number', value, shows } : { kind: 'text' };
