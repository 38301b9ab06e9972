import { z } from 'zod';
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

export const portLetters = ['A', 'B', 'C', 'D', 'E', 'F', 'G'] as const;

export const portOption = z.enum(portLetters, { error: `a port letter, ${portLetters[0]} to ${portLetters.at(-1)}` });
