import { importLimits } from '../limits.ts';
import { quoted, refuseAt } from '../refuse.ts';
import { asStored, type CodeArray } from './code-array.ts';

/** Bytes that follow each other without a gap. */
export interface Segment {
  readonly address: number;
  readonly bytes: Uint8Array;
  /** Line of its lowest record, from 1. */
  readonly line: number;
}

interface DataRecord {
  readonly address: number;
  readonly bytes: Uint8Array;
  readonly at: number;
  readonly line: number;
}

export const looksLikeIntelHex = (text: string) => /^\s*:[\da-fA-F]{10}/.test(text);

/**
 * Reads an Intel HEX file (Intel, Hexadecimal Object File Format Specification, revision A, 1988): data, end of file,
 * extended segment and linear addresses, start addresses. Every record's length and checksum is looked at.
 *
 * @returns segments by address
 * @throws {Refusal} naming line and column
 */
export function readIntelHex(text: string): Segment[] {
  const records: DataRecord[] = [];
  let base = 0;
  let isSegmented = false;
  let isEnded = false;
  let total = 0;
  let line = 0;
  for (let at = 0; at < text.length;) {
    let end = at;
    while (end < text.length && text[end] !== '\n' && text[end] !== '\r') end += 1;
    line += 1;
    const start = at;
    at = text.startsWith('\r\n', end) ? end + 2 : end + 1;
    if (isBlank(text, start, end)) continue;
    if (isEnded) refuseAt(text, start, 'a record behind the end record', 'nothing there');
    const { offset, type, bytes } = readRecord(text, start, end);
    if (type === 0) {
      total += bytes.length;
      if (total > importLimits.imageBytes) {
        refuseAt(text, start, 'more data', `at most ${importLimits.imageBytes} bytes in all`);
      }
      // Offsets of segmented addresses wrap at 64 KiB; a record that does is refused rather than torn.
      if (offset + bytes.length > 0x10000 && isSegmented) {
        refuseAt(text, start, 'a record over the end of its segment', 'records that end within 64 KiB');
      }
      if (bytes.length > 0) records.push({ address: base + offset, bytes, at: start, line });
    } else if (type === 1) isEnded = true;
    else if (type === 2 || type === 4) {
      if (bytes.length !== 2) refuseAt(text, start + 1, `${bytes.length} bytes of address`, '2 bytes');
      isSegmented = type === 2;
      base = (bytes[0] * 256 + bytes[1]) * (isSegmented ? 16 : 65_536);
    } else if (type !== 3 && type !== 5) refuseAt(text, start + 7, `record type ${type}`, 'types 0 to 5');
  }
  if (!isEnded) refuseAt(text, text.length, 'the end of the text', 'an end record, :00000001FF');
  if (records.length === 0) refuseAt(text, 0, 'a file without data records', 'at least 1 byte');
  return segmentsOf(text, records);
}

const isBlank = (text: string, start: number, end: number) => {
  for (let i = start; i < end; i += 1) if (text.charCodeAt(i) > 32) return false;
  return true;
};

function hexAt(text: string, at: number): number {
  const unit = text.charCodeAt(at);
  if (unit >= 48 && unit <= 57) return unit - 48;
  const lower = unit | 32;
  return lower >= 97 && lower <= 102 ? lower - 87 : -1;
}

function readRecord(text: string, start: number, lineEnd: number) {
  let end = lineEnd;
  while (end > start && text.charCodeAt(end - 1) <= 32) end -= 1;
  if (text[start] !== ':')
    refuseAt(text, start, quoted(text, start, Math.min(end, start + 20)), 'a record, which begins with ":"');
  const raw = new Uint8Array((end - start - 1) >> 1);
  let sum = 0;
  for (let i = 0; i < raw.length; i += 1) {
    const at = start + 1 + 2 * i;
    const [high, low] = [hexAt(text, at), hexAt(text, at + 1)];
    if (high < 0 || low < 0) {
      const wrong = high < 0 ? at : at + 1;
      refuseAt(text, wrong, quoted(text, wrong, wrong + 1), 'a hexadecimal digit');
    }
    raw[i] = high * 16 + low;
    sum += raw[i];
  }
  if ((end - start) % 2 === 0) refuseAt(text, end - 1, 'half a byte', 'two digits a byte');
  if (raw.length < 5 || raw.length !== raw[0] + 5) {
    const given = Math.max(0, raw.length - 5);
    refuseAt(text, start + 1, `a record of ${given} bytes of data`, `the ${raw[0] ?? 0} that it says it has`);
  }
  if (sum % 256 !== 0) {
    const right = (256 - ((sum - raw[raw.length - 1]) % 256)) % 256;
    const said = quoted(text, end - 2, end);
    refuseAt(
      text,
      end - 2,
      `checksum ${said}`,
      `"${right.toString(16).toUpperCase().padStart(2, '0')}", which the record's bytes give`,
    );
  }
  return { offset: raw[1] * 256 + raw[2], type: raw[3], bytes: raw.subarray(4, raw.length - 1) };
}

function segmentsOf(text: string, records: DataRecord[]): Segment[] {
  records.sort((a, b) => a.address - b.address || a.at - b.at);
  const segments: Segment[] = [];
  let first = 0;
  for (let i = 1; i <= records.length; i += 1) {
    const last = records[i - 1];
    const end = last.address + last.bytes.length;
    const next = records[i] as DataRecord | undefined;
    if (next && next.address < end) {
      const later = next.at > last.at ? next : last;
      refuseAt(
        text,
        later.at,
        `data at ${sayAddress(next.address)} once more`,
        'one record for each address',
      );
    }
    if (next && next.address === end) continue;
    const address = records[first].address;
    const bytes = new Uint8Array(end - address);
    for (const record of records.slice(first, i)) bytes.set(record.bytes, record.address - address);
    segments.push({ address, bytes, line: records[first].line });
    first = i;
  }
  return segments;
}

export const sayAddress = (address: number) => `0x${address.toString(16).toUpperCase().padStart(4, '0')}`;

export interface HexWords {
  readonly wordBits: 8 | 16;
  /** Which byte of a word stands at the lower address. */
  readonly byteOrder: 'low-first' | 'high-first';
  readonly isSigned: boolean;
}

/** A stretch of an image as an array of words. A last byte that makes no whole word is left out, with a note. */
export function wordsOf(
  { address, bytes, line }: Segment,
  { wordBits, byteOrder, isSigned }: HexWords,
): CodeArray {
  const size = wordBits / 8;
  const count = Math.floor(bytes.length / size);
  const given: number[] = [];
  for (let i = 0; i < count; i += 1) {
    if (size === 1) given.push(bytes[i]);
    else {
      const low = byteOrder === 'low-first' ? 0 : 1;
      given.push(bytes[2 * i + low] + 256 * bytes[2 * i + 1 - low]);
    }
  }
  const { values } = asStored(given, { wordBits, isSigned });
  const left = bytes.length - count * size;
  return {
    name: sayAddress(address),
    line,
    typeName: wordBits === 8 ? 'byte' : 'word of 2 bytes',
    wordBits,
    isSigned,
    values,
    notes: left > 0 ? ['The last byte makes no whole word and is left out.'] : [],
  };
}
