import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { contentOf, readableContent } from '../../shared/firmware/index.ts';
import { fromBase64, toBase64 } from '../../shared/firmware/base64.ts';

describe('content of a file', () => {
  it('is base64 as Node.js writes it, and the same bytes again', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 300 }), (bytes) => {
        const text = Buffer.from(bytes).toString('base64');
        expect(toBase64(bytes)).toBe(text);
        expect(Buffer.from(fromBase64(text))).toEqual(Buffer.from(bytes));
        const content = contentOf({ name: 'a.bin', text, encoding: 'base64' });
        expect(Buffer.from(content)).toEqual(Buffer.from(bytes));
      }),
      { seed: 4_648, numRuns: 500 },
    );
  });

  it('is UTF-8 where it is text', () => {
    const text = 'Töne 霧笛 📯\r\n';
    expect(Buffer.from(contentOf({ name: 'a.txt', text, encoding: 'utf-8' }))).toEqual(Buffer.from(text));
    expect(readableContent({ name: 'a.txt', text, encoding: 'utf-8' })).toBe(text);
  });

  it('is shown with offsets, and with what is left out', () => {
    const bytes = Buffer.from(Array.from({ length: 40 }, (_, k) => 255 - k));
    const file = { name: 'a.bin', text: bytes.toString('base64'), encoding: 'base64' } as const;
    expect(readableContent(file, 32)).toBe(
      '000000  FF FE FD FC FB FA F9 F8 F7 F6 F5 F4 F3 F2 F1 F0\n' +
        '000010  EF EE ED EC EB EA E9 E8 E7 E6 E5 E4 E3 E2 E1 E0\n… 8 bytes more\n',
    );
  });
});
