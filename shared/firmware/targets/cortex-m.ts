import { cFiles, layOutForC, processorOptions } from '../c-playback.ts';
import { defineTarget } from '../target.ts';

/** C for Arm Cortex-M: the processor's own SysTick timer paces the words. */
export const cortexM = defineTarget({
  id: 'cortex-m',
  title: 'Cortex-M C source with SysTick playback',
  commentOf: (text) => `// ${text}`,
  options: processorOptions,
  layOut: layOutForC,
  filesOf: (input) => cFiles('cortex-m', input),
});
