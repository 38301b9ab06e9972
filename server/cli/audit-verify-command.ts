import { join } from 'node:path';
import { InvalidArgumentError, type Command } from 'commander';
import { slugField } from '../../shared/contract/index.ts';
import { projectFolder } from '../project-folder.ts';

/** Status where there is no database to read, or no such team. */
const cannotTell = 2;

/**
 * `audit-verify [--team SLUG] [--json]`. The database's driver is not in this bundle, which every command loads as a
 * whole: the work is done by a program of its own.
 */
export function addAuditVerify(command: Command): void {
  command
    .option('--team <slug>', 'this team alone; without it, every team', readSlug)
    .option('--json', 'print { whole, teams } as JSON')
    .action(({ team, json }: { team?: string; json?: true }) => {
      const flags = [...(team === undefined ? [] : ['--team', team]), ...(json ? ['--json'] : [])];
      const script = join(projectFolder, 'server', 'setup', 'audit-verify.mjs');
      // Not by `import`: that would load it for every other command, too.
      const { spawnSync } = process.getBuiltinModule('node:child_process');
      const { status } = spawnSync(process.execPath, [script, ...flags], { stdio: 'inherit' });
      process.exitCode = status ?? cannotTell;
    });
}

function readSlug(typed: string): string {
  if (slugField.safeParse(typed).success) return typed;
  throw new InvalidArgumentError('It is no address of a team.');
}
