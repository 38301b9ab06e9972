import type { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { bundleModule } from './bundle-module.ts';
import { judge, median } from './judge.ts';
import { NumpyPipeline, type NumpyTable } from './numpy-pipeline.ts';

interface Case {
  length: number;
  bits: number;
  partials: number;
  /** Runs in one turn, some tens of milliseconds. */
  runs: number;
  goal: number;
}

const cases: Case[] = [
  { length: 256, bits: 8, partials: 32, runs: 400, goal: 0.25 },
  { length: 4096, bits: 12, partials: 64, runs: 100, goal: 0.5 },
  { length: 65_536, bits: 16, partials: 64, runs: 8, goal: 1 },
];
const turns = 21;
/** Turns that only warm both sides up. */
const coldTurns = 6;

/**
 * `buildTable` beside the same pipeline in vectorised NumPy, turn and turn about in one call, so that what else the
 * machine does meets both. The engine is bundled as it is shipped. Results are compared before times.
 */
export async function measureEngine(): Promise<boolean> {
  const bundle = await bundleModule(new URL('../../shared/build-table.ts', import.meta.url), 'engine');
  const engine = (await import(bundle)) as { buildTable: typeof buildTable };
  const numpy = new NumpyPipeline();
  try {
    const met: boolean[] = [];
    for (const each of cases) met.push(await measureCase(each, engine.buildTable, numpy));
    return met.every(Boolean);
  } finally {
    numpy.close();
  }
}

/** Partials of falling strength and of no common phase. */
function definitionOf({ length, bits, partials }: Case): DefinitionInput {
  return {
    schema: 1,
    name: 'measured',
    source: {
      kind: 'harmonics',
      offset: 0,
      partials: Array.from({ length: partials }, (_, i) => ({
        harmonic: i + 1,
        amplitude: 1 / (i + 1),
        phaseDeg: (i * 37) % 360,
      })),
    },
    table: { length, bits },
  };
}

async function measureCase(each: Case, build: typeof buildTable, numpy: NumpyPipeline): Promise<boolean> {
  const { length, bits, partials, runs, goal } = each;
  const definition = definitionOf(each);
  mustAgree(build(definition), await numpy.open(definition));

  const own: number[] = [];
  const theirs: number[] = [];
  for (let turn = 0; turn < turns; turn += 1) {
    const ours = timesOf(runs, () => build(definition));
    const other = await numpy.run(runs);
    if (turn < coldTurns) continue;
    own.push(...ours);
    theirs.push(...other);
  }
  const [ownMs, theirsMs] = [median(own), median(theirs)];
  console.log(
    `  ${length}×${bits}, ${partials} partials: ${ownMs.toFixed(4)} ms, NumPy ${theirsMs.toFixed(4)} ms`,
  );
  return judge('  as a share of NumPy', ownMs / theirsMs, goal);
}

function timesOf(runs: number, work: () => unknown): number[] {
  return Array.from({ length: runs }, () => {
    const start = performance.now();
    work();
    return performance.now() - start;
  });
}

/** Two programs that do not give the same table are not worth timing. */
function mustAgree(table: ReturnType<typeof buildTable>, wanted: NumpyTable): void {
  const faults: string[] = [];
  if (!wanted.codes.every((code, k) => code === table.codes[k])) faults.push('codes');
  if (!wanted.stored.every((word, k) => word === table.stored[k])) faults.push('stored words');
  const isClose = (a: number, b: number) => Math.abs(a - b) <= Math.max(1e-7, 1e-6 * Math.abs(b));
  if (!wanted.spectrum.every((amplitude, k) => isClose(table.spectrum.amplitudes[k], amplitude)))
    faults.push('spectrum');
  for (const [figure, value] of Object.entries(wanted.report)) {
    const told = table.report[figure as keyof typeof table.report];
    const same =
      typeof told === 'number' && typeof value === 'number'
        ? figure.endsWith('Db')
          ? Math.abs(told - value) <= 0.001
          : isClose(told, value)
        : JSON.stringify(told) === JSON.stringify(value);
    if (!same) faults.push(`${figure}: ${JSON.stringify(told)}, NumPy ${JSON.stringify(value)}`);
  }
  if (faults.length > 0) throw new Error(`The engine and NumPy do not agree: ${faults.join('; ')}`);
}
