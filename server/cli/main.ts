import { Command, CommanderError } from 'commander';
import { Refusal } from '../../shared/contract/index.ts';
import { say, sayError } from './output.ts';
import { onOneLine, sayRefusal } from './terminal.ts';

/** Each command's code loads only when it is called for: `report` needs no templates. */
const commands = {
  render: {
    summary: 'write the files of one export',
    load: async () => (await import('./render-command.ts')).addRender,
  },
  report: {
    summary: 'say how good a table is',
    load: async () => (await import('./report-command.ts')).addReport,
  },
  ladder: {
    summary: 'say what a resistor ladder puts out',
    load: async () => (await import('./ladder-command.ts')).addLadder,
  },
  spurs: {
    summary: 'say what a phase accumulator makes of a table',
    load: async () => (await import('./spurs-command.ts')).addSpurs,
  },
  'audit-verify': {
    summary: 'say whether the audit trail in the database is whole',
    load: async () => (await import('./audit-verify-command.ts')).addAuditVerify,
  },
} as const;

/** Input or usage is wrong. */
const wrongInput = 2;

/** Help goes out as it is; of errors we say one line of our own. */
const output = { writeOut: say, writeErr: () => undefined };

async function main(args: readonly string[]): Promise<void> {
  const program = new Command('stepwell')
    .description('Wave tables from their definitions, by the engine of the bench; no server needed.')
    .exitOverride()
    .configureOutput(output);
  for (const [name, { summary, load }] of Object.entries(commands)) {
    const command = program.command(name).summary(summary).description(summary).exitOverride();
    command.configureOutput(output);
    if (args[0] === name || (args[0] === 'help' && args[1] === name)) (await load())(command);
  }
  try {
    await program.parseAsync(args, { from: 'user' });
  } catch (error) {
    if (error instanceof Refusal) fail(sayRefusal(error));
    else if (error instanceof CommanderError) failUsage(program, error, args);
    else throw error;
  }
}

function failUsage(program: Command, error: CommanderError, args: readonly string[]): void {
  if (error.exitCode === 0) return;
  const command = program.commands.find((candidate) => candidate.name() === args[0]);
  const value = error.code === 'commander.help' ? 'no command' : error.message.replace(/^error: /, '');
  const allowed = command
    ? `${program.name()} ${command.name()} ${command.usage()} (see ${command.name()} --help)`
    : `${program.name()} with one of ${Object.keys(commands).join(', ')} (see --help)`;
  fail(onOneLine(`usage: ${value.replace(/\s*\n\s*/g, ' ')}; allowed: ${allowed}`));
}

/** Says on one line what is wrong. The status is set, not forced, so that what was written still arrives. */
function fail(line: string): void {
  sayError(line);
  process.exitCode = wrongInput;
}

void main(process.argv.slice(2));
