import { cFiles, layOutForC, portableOptions } from '../c-playback.ts';
import { defineTarget } from '../target.ts';

/** A header and a source in ISO C99 that any later C and C++ takes too. */
export const c99 = defineTarget({
  id: 'c99',
  title: 'C99 header and source',
  commentOf: (text) => `// ${text}`,
  options: portableOptions,
  layOut: layOutForC,
  filesOf: (input) => cFiles('c99', input),
});
