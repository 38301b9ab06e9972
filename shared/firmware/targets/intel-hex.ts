import { z } from 'zod';
import { Refusal, showValue } from '../../contract/index.ts';
import { intelHex as hexOf } from '../intel-hex.ts';
import { bytesOf } from '../layout.ts';
import {
  addressOption,
  endiannessOption,
  lineEndingOption,
  nameOptions,
  packedOption,
  portMapOptions,
} from '../options.ts';
import { defineTarget } from '../target.ts';

/** The bytes at an address, in records with checksums; one file a port, each from the same address. */
export const intelHex = defineTarget({
  id: 'intel-hex',
  title: 'Intel HEX image',
  options: z.strictObject({
    ...nameOptions,
    lineEnding: lineEndingOption,
    address: addressOption().default(0).describe('address of the first byte, as 0x08010000'),
    endianness: endiannessOption,
    packed: packedOption,
    ...portMapOptions,
  }),
  filesOf: ({ layout, options }) =>
    layout.arrays.map((array) => {
      const bytes = bytesOf(array, options.endianness);
      const most = 2 ** 32 - bytes.length;
      if (options.address > most) {
        throw new Refusal({
          path: 'options.address',
          value: showValue(options.address),
          allowed: `at most ${most}, so that ${bytes.length} bytes end within 32 bits`,
        });
      }
      return {
        template: 'intel-hex/image.hex',
        ending: `${array.suffix}.hex`,
        facts: { records: hexOf(bytes, options.address) },
      };
    }),
});
