import { refuseFile } from './refuse.ts';

const chunk = 8_192;

/**
 * Text of a file: UTF-8 or, with a byte order mark, UTF-16; anything else is taken byte by byte as ISO 8859-1, which
 * old sources are often written in and which leaves their numbers as they are.
 *
 * @throws {Refusal} where it holds NUL bytes: such a file is no text
 */
export function decodeText(bytes: Uint8Array): string {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return utf16(bytes, 'little');
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return utf16(bytes, 'big');
  const nul = bytes.indexOf(0);
  if (nul >= 0) refuseFile(`a NUL byte at offset ${nul}`, 'text, or a recording in a RIFF WAVE file');
  return utf8(bytes) ?? joined(bytes.length, (i) => bytes[i]);
}

function utf16(bytes: Uint8Array, order: 'little' | 'big'): string {
  const high = order === 'little' ? 1 : 0;
  return joined((bytes.length - 2) >> 1, (i) => (bytes[2 + 2 * i + high] << 8) | bytes[3 + 2 * i - high]);
}

function joined(count: number, unitAt: (i: number) => number): string {
  const parts: string[] = [];
  for (let start = 0; start < count; start += chunk) {
    const units = Array.from({ length: Math.min(chunk, count - start) }, (_, i) => unitAt(start + i));
    parts.push(String.fromCharCode(...units));
  }
  return parts.join('');
}

/** Well-formed UTF-8 (RFC 3629) as text, without its byte order mark; undefined where it is not well-formed. */
function utf8(bytes: Uint8Array): string | undefined {
  const units = new Uint16Array(bytes.length);
  let count = 0;
  let i = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
  while (i < bytes.length) {
    const lead = bytes[i];
    i += 1;
    if (lead < 0x80) {
      units[count] = lead;
      count += 1;
      continue;
    }
    const more = lead >= 0xf0 ? 3 : lead >= 0xe0 ? 2 : 1;
    if (lead < 0xc2 || lead > 0xf4 || i + more > bytes.length) return undefined;
    let point = lead & (0x3f >> more);
    for (let k = 0; k < more; k += 1, i += 1) {
      if ((bytes[i] & 0xc0) !== 0x80) return undefined;
      point = (point << 6) | (bytes[i] & 0x3f);
    }
    const isOverlong = point < [0x80, 0x800, 0x10000][more - 1];
    if (isOverlong || point > 0x10ffff || (point >= 0xd800 && point < 0xe000)) return undefined;
    if (point < 0x10000) {
      units[count] = point;
      count += 1;
    } else {
      units[count] = 0xd7c0 + (point >> 10);
      units[count + 1] = 0xdc00 + (point & 0x3ff);
      count += 2;
    }
  }
  return joined(count, (k) => units[k]);
}
