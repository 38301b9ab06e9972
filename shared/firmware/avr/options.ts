import { z } from 'zod';
import {
  numberOptions,
  packedOption,
  portMapOptions,
  portOption,
  sharedOptions,
  storageOptions,
  wholeNumberOption,
  wordOption,
} from '../options.ts';
import { pulsesOption } from '../pattern.ts';
import { playbackOptions } from '../playback-options.ts';

const playbacks = [
  'loop',
  'timer',
  'accumulator',
  'timer-accumulator',
  'two-accumulators',
  'once',
  'none',
] as const;

export const avrOptions = z.strictObject({
  ...sharedOptions,
  arrayName: sharedOptions.arrayName.refine((name) => name === undefined || /[a-z]/.test(name), {
    error: 'a name with a lower-case letter: avr-libc names registers in capitals',
  }),
  ...numberOptions,
  ...storageOptions,
  packed: packedOption,
  port: portOption.default('B').describe('port that the words go to, bit 0 on pin 0, without a port map'),
  highPort: portOption
    .optional()
    .describe('port of bit 8 and up, above 8 bits; D, or B where D is taken, if not given'),
  ...portMapOptions,
  pulses: pulsesOption,
  playback: wordOption(playbacks)
    .default('loop')
    .describe(
      'what plays: a free-running loop, a timer interrupt, a loop or interrupts with a phase accumulator, two summed, the wave once, or nothing',
    ),
  unroll: wordOption(['none', 'two', 'whole'])
    .default('none')
    .describe('loop: words in a turn; whole takes a few instructions a word and is the fastest'),
  ...playbackOptions,
  prescaler: wordOption(['1', '8', '64', '256', '1024'])
    .default('1')
    .describe('division of the clock before the timer'),
  compare: wholeNumberOption(0, 65_535)
    .default(499)
    .describe('compare register of the timer: a word each prescaler × (compare + 1) cycles'),
});

export type AvrOptions = z.output<typeof avrOptions>;
