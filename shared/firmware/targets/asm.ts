import { z } from 'zod';
import { Refusal, showValue } from '../../contract/index.ts';
import { numberOptions, packedOption, portMapOptions, sharedOptions, storageOptions } from '../options.ts';
import { alignmentFacts } from '../storage-facts.ts';
import { defineTarget } from '../target.ts';

/** Names that assemblers read as registers: Arm's and RISC-V's procedure call standards, and x86-64's. */
const registerName =
  /^(?:[rxdqvfkwastc]\d+|[sf][aipst]|sp|lr|pc|gp|tp|ra|ip|zero|[fs]t?\d+|fa\d+|e?[abcd]x|[abcd][hl]|r?[abcd]x|[re]?(?:si|di|bp|sp|ip)|apsr|cpsr|spsr|[x-z])$/i;

const noRegister = 'a name that is no register of a processor';

const directives = { 1: '.byte', 2: '.2byte', 4: '.4byte' } as const;

/** A source for GNU as, whatever the processor, and a header for C that declares it. */
export const asm = defineTarget({
  id: 'asm',
  title: 'GNU assembler source and C header',
  commentOf: (text) => `/* ${text} */`,
  numbersOf: (bytes) => ({ indent: `    ${directives[bytes]} `, rowEnd: '' }),
  options: z.strictObject({
    ...sharedOptions,
    arrayName: sharedOptions.arrayName.refine((name) => name === undefined || !registerName.test(name), {
      error: noRegister,
    }),
    ...numberOptions,
    ...storageOptions,
    packed: packedOption,
    ...portMapOptions,
  }),
  filesOf: ({ options, arrayName }) => {
    // A name that was made from the definition's has not been through the option's schema.
    if (registerName.test(arrayName)) {
      throw new Refusal({
        path: 'options.arrayName',
        value: showValue(arrayName),
        allowed: noRegister,
      });
    }
    const facts = { ...alignmentFacts(options), sourceEnding: '.s' };
    return [
      { template: 'asm/header.h', ending: '.h', facts },
      { template: 'asm/source.s', ending: '.s', facts },
    ];
  },
});
