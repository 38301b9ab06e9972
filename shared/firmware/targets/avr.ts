import { avrFiles } from '../avr/files.ts';
import { avrOptions, type AvrOptions } from '../avr/options.ts';
import { layOutForAvr } from '../avr/ports.ts';
import { defineTarget } from '../target.ts';

/** A table in program memory for avr-gcc, and code that plays it on one port, or on two. */
export const avr = defineTarget({
  id: 'avr',
  title: 'AVR program memory and playback',
  commentOf: (text) => `// ${text}`,
  options: avrOptions,
  layOut: (table, given) => layOutForAvr(table, given as AvrOptions),
  filesOf: avrFiles,
});
