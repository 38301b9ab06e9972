import { z } from 'zod';
import { numberOptions, packedOption, portMapOptions, sharedOptions, storageOptions } from '../options.ts';
import { alignmentFacts } from '../storage-facts.ts';
import { defineTarget } from '../target.ts';

/** A header and a source in ISO C99 that any later C and C++ takes too. */
export const c99 = defineTarget({
  id: 'c99',
  title: 'C99 header and source',
  commentOf: (text) => `// ${text}`,
  options: z.strictObject({
    ...sharedOptions,
    ...numberOptions,
    ...storageOptions,
    packed: packedOption,
    ...portMapOptions,
  }),
  filesOf: ({ options }) => {
    const facts = alignmentFacts(options);
    return [
      { template: 'c99/header.h', ending: '.h', facts },
      { template: 'c99/source.c', ending: '.c', facts },
    ];
  },
});
