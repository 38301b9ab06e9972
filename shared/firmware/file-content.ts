import { utf8ToBytes } from '@noble/hashes/utils.js';
import type { GeneratedFile } from '../contract/index.ts';
import { fromBase64 } from './base64.ts';

/** The bytes of a file of an export, as they belong on a disk. */
export function contentOf({ text, encoding }: GeneratedFile): Uint8Array {
  return encoding === 'base64' ? fromBase64(text) : utf8ToBytes(text);
}

const bytesPerLine = 16;

/** Content to read on a screen: a text as it is, bytes as offset and hexadecimal, at most `most` of them. */
export function readableContent(file: GeneratedFile, most = 4096): string {
  if (file.encoding === 'utf-8') return file.text;
  const bytes = contentOf(file);
  const lines: string[] = [];
  for (let start = 0; start < Math.min(bytes.length, most); start += bytesPerLine) {
    const line = Array.from(bytes.subarray(start, start + bytesPerLine), (byte) => hex(byte, 2));
    lines.push(`${hex(start, 6)}  ${line.join(' ')}`);
  }
  if (bytes.length > most) lines.push(`… ${bytes.length - most} bytes more`);
  return `${lines.join('\n')}\n`;
}

const hex = (value: number, digits: number) => value.toString(16).toUpperCase().padStart(digits, '0');
