import { z } from 'zod';
import { Refusal, showValue } from '../../contract/index.ts';
import { portOption, sharedOptions } from '../options.ts';
import { defineTarget, type ExportableTable } from '../target.ts';
import { wordTypeOf } from '../word-type.ts';

/** avr-gcc's largest object: sizes and differences of pointers are 16-bit, signed. */
const largestObject = 32_767;

/** A table in program memory for avr-gcc, and a main that writes it to one port, or to two above 8 bits, for ever. */
export const avr = defineTarget({
  id: 'avr',
  title: 'AVR program memory and port loop',
  lineComment: '//',
  files: [
    { template: 'avr/header.h', ending: '.h' },
    { template: 'avr/source.c', ending: '.c' },
    { template: 'avr/main.c', ending: '_main.c' },
  ],
  options: z.strictObject({
    ...sharedOptions,
    arrayName: sharedOptions.arrayName.refine((name) => name === undefined || /[a-z]/.test(name), {
      error: 'a name with a lower-case letter: avr-libc names registers in capitals',
    }),
    port: portOption.default('B').describe('port that the words go to, bit 0 on pin 0'),
    highPort: portOption
      .optional()
      .describe('port of bit 8 and up, above 8 bits; D, or B where D is taken, if not given'),
  }),
  factsOf: (table, { port, highPort }) => {
    const { bits } = table.definition.table;
    refuseUnplayable(table);
    const upperPort = highPort ?? (port === 'D' ? 'B' : 'D');
    if (bits > 8 && upperPort === port) {
      throw new Refusal({
        path: 'options.highPort',
        value: showValue(highPort),
        allowed: `a port letter other than options.port, ${port}`,
      });
    }
    return {
      port,
      highPort: bits > 8 ? upperPort : false,
      portMask: pinMask(Math.min(bits, 8)),
      highPortMask: pinMask(bits - 8),
      topBit: bits - 1,
      topPinOfPort: Math.min(bits, 8) - 1,
      topPinOfHighPort: bits - 9,
    };
  },
});

/** Pins 0…count−1 of a port, in hexadecimal. */
const pinMask = (count: number) =>
  `0x${(2 ** Math.max(count, 0) - 1).toString(16).toUpperCase().padStart(2, '0')}`;

function refuseUnplayable({ definition: { table }, stored }: ExportableTable): void {
  if (table.fold !== 'none') {
    throw new Refusal({
      path: 'table.fold',
      value: showValue(table.fold),
      allowed: '"none" for the target avr',
    });
  }
  const most = Math.floor(largestObject / wordTypeOf(table).bytes);
  if (stored.length > most) {
    throw new Refusal({
      path: 'table.length',
      value: showValue(stored.length),
      allowed: `at most ${most} entries of ${table.bits} bits for the target avr, whose arrays end at ${largestObject} bytes`,
    });
  }
}
