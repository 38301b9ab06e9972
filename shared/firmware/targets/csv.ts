import { z } from 'zod';
import { lineEndingOption, nameOptions, portMapOptions } from '../options.ts';
import { defineTarget } from '../target.ts';

/** Entry, code and stored word, a line each; with a port map what each port shows, too. */
export const csv = defineTarget({
  id: 'csv',
  title: 'CSV for spreadsheets and scripts',
  options: z.strictObject({ ...nameOptions, lineEnding: lineEndingOption, ...portMapOptions }),
  filesOf: ({ table: { codes, stored }, layout }) => {
    const ports = layout.map === undefined ? [] : layout.arrays;
    const lines = new Array<string>(stored.length);
    for (let k = 0; k < stored.length; k += 1) {
      let line = `${k},${codes[k]},${stored[k]}`;
      for (const { elements } of ports) line += `,${elements[k] >>> 0}`;
      lines[k] = line;
    }
    return [
      {
        template: 'csv/table.csv',
        ending: '.csv',
        facts: { lines: lines.join('\n'), ports: ports.length > 0 },
      },
    ];
  },
});
