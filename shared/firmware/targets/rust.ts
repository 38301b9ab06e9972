import { z } from 'zod';
import { numberOptions, packedOption, portMapOptions, sharedOptions, storageOptions } from '../options.ts';
import { patternFiles, pulsesOption } from '../pattern.ts';
import { alignmentFacts } from '../storage-facts.ts';
import { defineTarget } from '../target.ts';
import { wordTypeOf } from '../word-type.ts';

/** A module without the standard library: constants, a static, and readers. */
export const rust = defineTarget({
  id: 'rust',
  title: 'Rust module without std',
  commentOf: (text) => `// ${text}`,
  options: z.strictObject({
    ...sharedOptions,
    ...numberOptions,
    ...storageOptions,
    packed: packedOption,
    ...portMapOptions,
    pulses: pulsesOption,
  }),
  filesOf: ({ table, options }) => {
    const { bytes, signed } = wordTypeOf(table.definition.table);
    const facts = {
      ...alignmentFacts(options),
      rustWordType: `${signed ? 'i' : 'u'}${8 * bytes}`,
    };
    return [{ template: 'rust/module.rs', ending: '.rs', facts }, ...patternFiles('rust', options.pulses)];
  },
});
