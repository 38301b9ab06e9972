import type { Command } from 'commander';
import { buildTable } from '../../shared/build-table.ts';
import { Refusal, showValue } from '../../shared/contract/index.ts';
import { analyseAccumulator, type Accumulator } from '../../shared/playback/index.ts';
import { say } from './output.ts';
import { readDefinition } from './read-definition.ts';
import { spursText } from './spurs-text.ts';

interface Flags {
  readonly accumulatorBits: string;
  readonly stepWord: string;
  readonly json?: true;
}

const flags: Readonly<Record<string, string>> = {
  accumulatorBits: '--accumulator-bits',
  stepWord: '--step-word',
};

/** `spurs DEFINITION.json --accumulator-bits M --step-word W [--json]`: a table played by a phase accumulator. */
export function addSpurs(command: Command): void {
  command
    .argument('<DEFINITION.json>', 'the definition, its length a power of two; - reads standard input')
    .requiredOption('--accumulator-bits <M>', 'width of the phase accumulator, up to 48')
    .requiredOption('--step-word <W>', 'what is added at each sample, 1 to 2^M - 1')
    .option('--json', 'print { period, carrierBin, worstOtherDbc, worstOtherBin, snrDb } as JSON')
    .action(async (file: string, { accumulatorBits, stepWord, json }: Flags) => {
      const table = buildTable(await readDefinition(file));
      try {
        const accumulator = {
          accumulatorBits: wholeNumber('accumulatorBits', accumulatorBits),
          stepWord: wholeNumber('stepWord', stepWord),
        };
        const figures = analyseAccumulator(table.values, accumulator);
        say(json ? asJson(figures) : spursText(table, accumulator, figures));
      } catch (error) {
        throw error instanceof Refusal ? inFlags(error) : error;
      }
    });
}

/** Exactly what the command line promises, whatever figures the engine comes to give besides. */
function asJson({
  period,
  carrierBin,
  worstOtherDbc,
  worstOtherBin,
  snrDb,
}: ReturnType<typeof analyseAccumulator>): string {
  return `${JSON.stringify({ period, carrierBin, worstOtherDbc, worstOtherBin, snrDb })}\n`;
}

/** Digits only: what is longer than a double holds would otherwise turn into another number. */
function wholeNumber(field: keyof Accumulator, text: string): number {
  const number = Number(text);
  if (/^\d+$/.test(text) && Number.isSafeInteger(number)) return number;
  throw new Refusal({ path: field, value: showValue(text), allowed: 'a whole number in digits, below 2^48' });
}

function inFlags({ problems }: Refusal): Refusal {
  const [first, ...others] = problems.map((problem) => ({
    ...problem,
    path: flags[problem.path] ?? problem.path,
  }));
  return new Refusal(first, ...others);
}
