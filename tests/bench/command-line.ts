import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { projectFolder } from '../../server/project-folder.ts';
import { judge, median } from './judge.ts';

const turns = 31;
const launcher = join(projectFolder, 'server', 'setup', 'stepwell.mjs');
const definition = {
  schema: 1,
  name: 'fog signal',
  source: {
    kind: 'harmonics',
    partials: [1, 2, 3, 5, 8].map((harmonic) => ({ harmonic, amplitude: 1 / harmonic, phaseDeg: 0 })),
  },
};

/** `stepwell report` of a file beside a bare `node -e 1`, turn and turn about. */
export function measureCommandLine(): boolean {
  const folder = mkdtempSync(join(tmpdir(), 'stepwell-speed-'));
  try {
    const file = join(folder, 'definition.json');
    writeFileSync(file, JSON.stringify(definition));
    const report: number[] = [];
    const bare: number[] = [];
    for (let turn = 0; turn <= turns; turn += 1) {
      const ours = millisecondsOf([launcher, 'report', file]);
      const node = millisecondsOf(['-e', '1']);
      // The first turn may have had to build the command line.
      if (turn === 0) continue;
      report.push(ours);
      bare.push(node);
    }
    const [reportMs, bareMs] = [median(report), median(bare)];
    console.log(`  report ${reportMs.toFixed(1)} ms, bare node ${bareMs.toFixed(1)} ms, medians of ${turns}`);
    return judge('  as a multiple of a bare node', reportMs / bareMs, 2);
  } finally {
    rmSync(folder, { recursive: true });
  }
}

function millisecondsOf(args: string[]): number {
  const start = performance.now();
  const { status, stderr, stdout } = spawnSync(process.execPath, args, {
    cwd: projectFolder,
    encoding: 'utf8',
  });
  const elapsed = performance.now() - start;
  if (status !== 0) throw new Error(`node ${args.join(' ')} ended with ${status}: ${stderr}`);
  if (args.includes('report') && !stdout.includes('SNR')) throw new Error(`No report came: ${stdout}`);
  return elapsed;
}
