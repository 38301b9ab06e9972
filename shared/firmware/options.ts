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

/** Schemas of what every target can be told (`SharedOptions`). */
export const sharedOptions = {
  arrayName: arrayNameOption,
  arrayPrefix: arrayPrefixOption,
  licenceLine: licenceLineOption,
};

export const portLetters = ['A', 'B', 'C', 'D', 'E', 'F', 'G'] as const;

export const portOption = z.enum(portLetters, {
  error: `a port letter, ${portLetters[0]} to ${portLetters.at(-1)}`,
});
