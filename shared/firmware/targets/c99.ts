import { z } from 'zod';
import { sharedOptions } from '../options.ts';
import { defineTarget } from '../target.ts';

/** A header and a source in ISO C99 that any later C and C++ takes too. */
export const c99 = defineTarget({
  id: 'c99',
  title: 'C99 header and source',
  lineComment: '//',
  files: [
    { template: 'c99/header.h', ending: '.h' },
    { template: 'c99/source.c', ending: '.c' },
  ],
  options: z.strictObject(sharedOptions),
  factsOf: () => ({}),
});
