import process from 'node:process';

// npm run speed [-- PART …]: figures of time, told beside their goals and never asserted. Other work on the machine
// shows in them: run it alone. A part is loaded when its turn comes, those of the engine first: numeric loops run a
// quarter slower in a process that has loaded the driver of browsers, and the product has none in it.

const parts: Record<string, { title: string; measure: () => boolean | Promise<boolean> }> = {
  engine: {
    title: 'buildTable beside vectorised NumPy',
    measure: async () => (await import('./engine.ts')).measureEngine(),
  },
  'output-stage': {
    title: 'Ladders and tolerance trials beside vectorised NumPy',
    measure: async () => (await import('./output-stage.ts')).measureOutputStage(),
  },
  playback: {
    title: 'The search over sizes beside vectorised NumPy, and phase accumulators',
    measure: async () => (await import('./playback.ts')).measurePlayback(),
  },
  listening: {
    title: 'Listening: the audio thread’s part, and making what is played',
    measure: async () => (await import('./listening.ts')).measureListening(),
  },
  imports: {
    title: 'What is brought in',
    measure: async () => (await import('./imports.ts')).measureImports(),
  },
  exports: {
    title: 'Exports of 65,536 entries',
    measure: async () => (await import('./exports.ts')).measureExports(),
  },
  cli: {
    title: 'The command line',
    measure: async () => (await import('./command-line.ts')).measureCommandLine(),
  },
  bench: {
    title: 'The bench in Chromium',
    measure: async () => {
      const [{ withClient }, { measureFirstPage }, { measureDrag }] = await Promise.all([
        import('./client.ts'),
        import('./first-page.ts'),
        import('./drag.ts'),
      ]);
      return withClient(async (address, browser) => {
        const isSmall = await measureFirstPage(address, browser);
        return (await measureDrag(address, browser)) && isSmall;
      });
    },
  },
  library: {
    title: 'The team library',
    measure: async () => (await import('./library.ts')).measureLibrary(),
  },
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
