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
    const lines = Array.from(stored, (word, k) =>
      [k, codes[k], word, ...ports.map(({ elements }) => elements[k] >>> 0)].join(','),
    );
    return [{ template: 'csv/table.csv', ending: '.csv', facts: { lines: lines.join('\n'), ports: ports.length > 0 } }];
  },
});
