import type { Command } from 'commander';
import { buildTable } from '../../shared/build-table.ts';
import { tableReportOf } from '../tables/table-report.ts';
import { say } from './output.ts';
import { readDefinition } from './read-definition.ts';
import { reportText } from './report-text.ts';

/** `report DEFINITION.json [--json]`: the figures of a table, to read or for a program. */
export function addReport(command: Command): void {
  command
    .argument('<DEFINITION.json>', 'the definition; - reads standard input')
    .option('--json', 'print { codes, stored, report, spectrum, warnings } as JSON')
    .action(async (file: string, { json }: { json?: true }) => {
      const table = buildTable(await readDefinition(file));
      say(json ? `${JSON.stringify(tableReportOf(table))}\n` : reportText(table));
    });
}
