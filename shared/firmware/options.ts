import { z } from 'zod';
import { arrayPrefixField, licenceLineField } from '../contract/index.ts';
import { arrayNameFault } from './c-identifier.ts';

/** Name of the array; made from the definition's name where left out. */
export const arrayNameOption = z
  .string({ error: 'a C identifier' })
  .superRefine((name, context) => {
    const allowed = arrayNameFault(name);
    if (allowed !== undefined) context.addIssue({ code: 'custom', message: allowed });
  })
  .optional()
  .describe('name of the array and of its files');

/** Put before a name that is made from the definition's; a name that is given stays as it is. */
export const arrayPrefixOption = arrayPrefixField
  .default('')
  .describe("put before an array's name that is made from the definition's");

export const licenceLineOption = licenceLineField
  .default('')
  .describe('a comment line at the top of each file, as SPDX-License-Identifier: MIT');

/** A choice of words, told apart by all of them. */
export const wordOption = <const Words extends readonly [string, ...string[]]>(words: Words) =>
  z.enum(words, { error: words.join(' or ') });

/** A whole number, as such or in decimal digits: the command line and addresses hold texts. */
export function wholeNumberOption(min: number, max: number) {
  const error = `a whole number from ${min} to ${max}`;
  return z.preprocess(
    (value) => (typeof value === 'string' && /^\d{1,15}$/.test(value) ? Number(value) : value),
    z.int({ error }).min(min, { error }).max(max, { error }),
  );
}

/** An address or a mask of at most 32 bits: a whole number, or its text in decimal or as 0x1F. */
export function addressOption() {
  const error = 'an address of at most 32 bits, as 0x40020C14';
  return z.preprocess(
    (value) =>
      typeof value === 'string' && /^(?:0[xX][0-9a-fA-F]{1,8}|\d{1,10})$/.test(value) ? Number(value) : value,
    z
      .int({ error })
      .min(0, { error })
      .max(2 ** 32 - 1, { error }),
  );
}

/** Schemas of what every target can be told (`SharedOptions`). */
export const nameOptions = { arrayName: arrayNameOption, arrayPrefix: arrayPrefixOption };

export const lineEndingOption = wordOption(['lf', 'crlf'])
  .default('lf')
  .describe('what lines end in: LF, or CR and LF');

/** Of targets whose files are text with comments. */
export const sharedOptions = { ...nameOptions, licenceLine: licenceLineOption, lineEnding: lineEndingOption };

/** How numbers stand in a source. */
export const numberOptions = {
  numberBase: wordOption(['decimal', 'hexadecimal']).default('decimal').describe('base of the numbers'),
  columns: wholeNumberOption(1, 64)
    .optional()
    .describe('numbers in a row, 1 to 64; by their width if not given'),
};

/** Where an array lies, and on what boundary. */
export const storageOptions = {
  storage: wordOption(['flash', 'ram'])
    .default('flash')
    .describe('flash for constant data, ram for a table that the program may change'),
  alignment: wordOption(['none', '2', '4', '8', '16', '32', '64', '128', '256', '512', '1024'])
    .default('none')
    .describe('boundary in bytes that the table begins on'),
};

export const packedOption = wordOption(['no', 'yes'])
  .default('no')
  .describe('two words of up to 4 bits in a byte, two of 9 to 12 bits in three bytes, the lower bits first');

export const endiannessOption = wordOption(['little', 'big'])
  .default('little')
  .describe('which byte of a longer word comes first: the lowest (little) or the highest (big)');

const placesText = (error: string) => z.string({ error }).max(400, { error: 'at most 400 characters' });

/** Bits on pins, permuted when the files are made: one write a port shows them all. */
export const portMapOptions = {
  portMap: placesText('places as B.0 B.1 B.2')
    .default('')
    .describe('place of each bit, bit 0 first, as B.0 B.1 D.4: words come permuted, one table a port'),
  reservedPins: placesText('places as B.6=high')
    .default('')
    .describe('pins of those ports that are something else’s, with their rest level, as B.6=high D.7=low'),
  reservedBy: wordOption(['baked', 'kept'])
    .default('baked')
    .describe('reserved pins: baked writes their rest levels with each word, kept leaves them to a mask'),
};

export const portLetters = ['A', 'B', 'C', 'D', 'E', 'F', 'G'] as const;

export const portOption = z.enum(portLetters, {
  error: `a port letter, ${portLetters[0]} to ${portLetters.at(-1)}`,
});
