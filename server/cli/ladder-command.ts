import type { Command } from 'commander';
import { parseLadder } from '../../shared/contract/index.ts';
import { ladderReport } from '../../shared/output-stage/index.ts';
import { ladderText } from './ladder-text.ts';
import { say } from './output.ts';
import { readDefinition } from './read-definition.ts';

/** `ladder LADDER.json [--json]`: volts of every code, INL, DNL and currents, to read or for a program. */
export function addLadder(command: Command): void {
  command
    .argument('<LADDER.json>', 'the ladder; - reads standard input')
    .option('--json', 'print volts, inl, dnl by code, and linearity and currents, as JSON')
    .action(async (file: string, { json }: { json?: true }) => {
      const ladder = parseLadder(await readDefinition(file));
      const report = ladderReport(ladder);
      say(json ? `${JSON.stringify(report, listsAsArrays)}\n` : ladderText(ladder, report));
    });
}

/** JSON has no typed arrays. */
const listsAsArrays = (_key: string, value: unknown) =>
  value instanceof Float64Array ? Array.from(value) : value;
