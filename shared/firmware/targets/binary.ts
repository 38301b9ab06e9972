import { z } from 'zod';
import { bytesOf } from '../layout.ts';
import { endiannessOption, nameOptions, packedOption, portMapOptions } from '../options.ts';
import { defineTarget } from '../target.ts';

/** The bytes alone, for a programmer or a linker; one file a port. */
export const binary = defineTarget({
  id: 'binary',
  title: 'Binary image',
  options: z.strictObject({
    ...nameOptions,
    endianness: endiannessOption,
    packed: packedOption,
    ...portMapOptions,
  }),
  filesOf: ({ layout, options }) =>
    layout.arrays.map((array) => ({
      ending: `${array.suffix}.bin`,
      bytes: bytesOf(array, options.endianness),
    })),
});
