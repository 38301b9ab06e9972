import { z } from 'zod';
import { numberOptions, packedOption, portMapOptions, sharedOptions, storageOptions } from '../options.ts';
import { patternFiles, pulsesOption } from '../pattern.ts';
import { alignmentFacts } from '../storage-facts.ts';
import { defineTarget } from '../target.ts';

/** One header for C++17 and later: constexpr arrays and readers in a namespace of the array's name. */
export const cpp17 = defineTarget({
  id: 'cpp17',
  title: 'C++17 header of constexpr arrays',
  commentOf: (text) => `// ${text}`,
  options: z.strictObject({
    ...sharedOptions,
    ...numberOptions,
    ...storageOptions,
    packed: packedOption,
    ...portMapOptions,
    pulses: pulsesOption,
  }),
  filesOf: ({ options }) => [
    {
      template: 'cpp17/header.hpp',
      ending: '.hpp',
      facts: { ...alignmentFacts(options), readerStart: 'word', readerEnd: '' },
    },
    ...patternFiles('cpp', options.pulses),
  ],
});
