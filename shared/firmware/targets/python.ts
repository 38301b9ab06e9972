import { z } from 'zod';
import { bytesOf } from '../layout.ts';
import { packedOption, portMapOptions, sharedOptions, wholeNumberOption } from '../options.ts';
import { patternFiles, pulsesOption } from '../pattern.ts';
import { defineTarget } from '../target.ts';

/** A module with the words in bytes literals, for interpreters on microcontrollers: no list, no heap at import. */
export const python = defineTarget({
  id: 'python',
  title: 'Python module of bytes',
  commentOf: (text) => `# ${text}`,
  options: z.strictObject({
    ...sharedOptions,
    columns: wholeNumberOption(1, 64).optional().describe('bytes in a row, 1 to 64; 16 if not given'),
    packed: packedOption,
    ...portMapOptions,
    pulses: pulsesOption,
  }),
  filesOf: ({ layout, options }) => [
    {
      template: 'python/module.py',
      ending: '.py',
      facts: {
        literals: layout.arrays.map((array) => ({
          port: array.ports.length > 0 && array.ports[0].name,
          name: `WORDS${array.suffix.toUpperCase()}`,
          bytes: array.bytes,
          rows: bytesLiteral(bytesOf(array, 'little'), options.columns ?? 16),
        })),
      },
    },
    ...patternFiles('python', options.pulses),
  ],
});

const escapes = Array.from({ length: 256 }, (_, byte) => `\\x${byte.toString(16).padStart(2, '0')}`);

/** Rows of adjacent literals: the compiler joins them, and the words never pass through a list. */
function bytesLiteral(bytes: Uint8Array, columns: number): string {
  const rows: string[] = [];
  for (let start = 0; start < bytes.length; start += columns) {
    let row = '';
    for (const byte of bytes.subarray(start, start + columns)) row += escapes[byte];
    rows.push(`    b"${row}"`);
  }
  return rows.join('\n');
}
