import { z } from 'zod';
import { patternOf, type StoredArray } from '../layout.ts';
import { packedOption, portMapOptions, sharedOptions } from '../options.ts';
import { defineTarget } from '../target.ts';

/** A memory image for $readmemh, a word a line; one file a port. */
export const verilogMemh = defineTarget({
  id: 'verilog-memh',
  title: 'Verilog memory image for $readmemh',
  commentOf: (text) => `// ${text}`,
  options: z.strictObject({ ...sharedOptions, packed: packedOption, ...portMapOptions }),
  filesOf: ({ table, layout }) =>
    layout.arrays.map((array) => {
      const width = widthOf(array, layout.packedBits === undefined ? table.definition.table.bits : 8);
      return {
        template: 'verilog-memh/image.memh',
        ending: `${array.suffix}.memh`,
        facts: { width, count: array.elements.length, lines: linesOf(array, width) },
      };
    }),
});

/** Bits of a memory's word: those of the table, or those of the port. */
const widthOf = ({ ports, bytes }: StoredArray, bits: number) => (ports.length === 0 ? bits : 8 * bytes);

function linesOf({ elements, bytes }: StoredArray, width: number): string {
  const digits = Math.ceil(width / 4);
  const mask = 2 ** width;
  return Array.from(elements, (element) =>
    (patternOf(element, bytes) % mask).toString(16).toUpperCase().padStart(digits, '0'),
  ).join('\n');
}
