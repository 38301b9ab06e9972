import { z } from 'zod';
import { Refusal, showValue } from '../../contract/index.ts';
import { nameOptions, wholeNumberOption } from '../options.ts';
import { defineTarget } from '../target.ts';
import { wavFile } from '../wav-file.ts';

/** Samples of a file at most: 2 MiB of 16 bits, as answers hold it in base64. */
const mostSamples = 1024 * 1024;

/** The codes as sound, before complement, coding and fold: to hear, or for a player that takes files. */
export const wav = defineTarget({
  id: 'wav',
  title: 'WAV sound of the codes',
  options: z.strictObject({
    ...nameOptions,
    sampleRateHz: wholeNumberOption(1, 768_000).default(48_000).describe('samples a second, in hertz'),
    repeats: wholeNumberOption(1, 65_536).default(1).describe('how often the table follows itself'),
  }),
  filesOf: ({ table: { codes, definition }, options: { sampleRateHz, repeats } }) => {
    if (codes.length * repeats > mostSamples) {
      throw new Refusal({
        path: 'options.repeats',
        value: showValue(repeats),
        allowed: `at most ${Math.floor(mostSamples / codes.length)} for ${codes.length} entries`,
      });
    }
    const bytes = wavFile(codes, { bits: definition.table.bits, sampleRateHz, repeats });
    return [{ ending: '.wav', bytes }];
  },
});
