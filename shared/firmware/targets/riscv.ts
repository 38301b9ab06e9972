import { addressOption } from '../options.ts';
import { cFiles, layOutForC, processorOptions } from '../c-playback.ts';
import { defineTarget } from '../target.ts';

/** C for RISC-V: the machine timer paces the words. Its registers lie where the platform has put them. */
export const riscv = defineTarget({
  id: 'riscv',
  title: 'RISC-V C source with machine timer playback',
  commentOf: (text) => `// ${text}`,
  options: processorOptions.extend({
    timeAddress: addressOption()
      .default(0x0200_bff8)
      .describe('address of the machine timer’s count, as 0x0200BFF8'),
    compareAddress: addressOption()
      .default(0x0200_4000)
      .describe('address of the machine timer’s compare register, as 0x02004000'),
  }),
  layOut: layOutForC,
  filesOf: (input) => {
    const hex = (address: number) => `0x${address.toString(16).toUpperCase().padStart(8, '0')}`;
    const { timeAddress, compareAddress } = input.options;
    const facts = { timeAddress: hex(timeAddress), compareAddress: hex(compareAddress) };
    return cFiles('riscv', input).map((file) =>
      'template' in file ? { ...file, facts: { ...file.facts, ...facts } } : file,
    );
  },
});
