import { withClient } from './client.ts';
import { measureCommandLine } from './command-line.ts';
import { measureDrag } from './drag.ts';
import { measureEngine } from './engine.ts';
import { measureExports } from './exports.ts';
import { measureFirstPage } from './first-page.ts';
import { measureImports } from './imports.ts';
import { measureLibrary } from './library.ts';
import { measureOutputStage } from './output-stage.ts';
import { measurePlayback } from './playback.ts';

// npm run speed [-- PART …]: figures of time, told beside their goals and never asserted. Other work on the machine
// shows in them: run it alone.

const parts: Record<string, { title: string; measure: () => boolean | Promise<boolean> }> = {
  engine: { title: 'buildTable beside vectorised NumPy', measure: measureEngine },
  'output-stage': {
    title: 'Ladders and tolerance trials beside vectorised NumPy',
    measure: measureOutputStage,
  },
  playback: {
    title: 'The search over sizes beside vectorised NumPy, and phase accumulators',
    measure: measurePlayback,
  },
  imports: { title: 'What is brought in', measure: measureImports },
  exports: { title: 'Exports of 65,536 entries', measure: measureExports },
  cli: { title: 'The command line', measure: measureCommandLine },
  bench: {
    title: 'The bench in Chromium',
    measure: () =>
      withClient(async (address, browser) => {
        const isSmall = await measureFirstPage(address, browser);
        return (await measureDrag(address, browser)) && isSmall;
      }),
  },
  library: { title: 'The team library', measure: measureLibrary },
};

const asked = process.argv.slice(2);
const unknown = asked.filter((part) => !Object.hasOwn(parts, part));
if (unknown.length > 0) {
  console.error(`${unknown.join(', ')}: no such part; there are ${Object.keys(parts).join(', ')}`);
  process.exit(2);
}

let missed = 0;
for (const [part, { title, measure }] of Object.entries(parts)) {
  if (asked.length > 0 && !asked.includes(part)) continue;
  console.log(title);
  if (!(await measure())) missed += 1;
}
console.log(missed === 0 ? 'Every goal was met.' : `Goals were missed in ${missed} of the parts above.`);
