import type { LadderInput } from '../../shared/contract/index.ts';
import { bundleModule } from './bundle-module.ts';
import { judge, median } from './judge.ts';
import { NumpyPipeline } from './numpy-pipeline.ts';
import type * as outputStageEntry from './output-stage-entry.ts';

type Engine = typeof outputStageEntry;
type Figures = Record<'maxInl' | 'maxDnl' | 'sinadDb' | 'unwantedDb', number[]> & { monotonic: boolean[] };

const trials = 10_000;
const turns = 25;
/** Turns that only warm both sides up. */
const coldTurns = 4;
const goals = { trialsMs: 1500, shareOfNumpy: 1, allCodesMs: 15 };

const cases: { name: string; ladder: LadderInput }[] = [
  { name: 'like pins', ladder: { bits: 8, R: 10_000 } },
  { name: 'unlike pins', ladder: { bits: 8, R: 10_000, rHigh: 35, rLow: 22 } },
];

/**
 * All codes of a 16-bit ladder; and tolerance trials of an 8-bit ladder with INL, DNL, SINAD and the strongest
 * unwanted line, beside NumPy given the same ladders. Our time holds the drawing of resistors too, NumPy's does not.
 * Results are compared before times.
 */
export async function measureOutputStage(): Promise<boolean> {
  const bundle = await bundleModule(new URL('output-stage-entry.ts', import.meta.url), 'output-stage');
  const engine = (await import(bundle)) as Engine;
  const met = [measureAllCodes(engine)];
  const numpy = new NumpyPipeline<Figures>('trials.py');
  try {
    for (const each of cases) met.push(await measureTrials(each, engine, numpy));
  } finally {
    numpy.close();
  }
  return met.every(Boolean);
}

function measureAllCodes({ parseLadder, voltsOf }: Engine): boolean {
  const ladder = parseLadder({ bits: 16, R: 10_000, rHigh: 35, rLow: 22 });
  const times = Array.from({ length: 41 }, () => timeOf(() => voltsOf(ladder)));
  return judge('All codes of a 16-bit ladder', median(times), goals.allCodesMs, ' ms');
}

async function measureTrials(
  { name, ladder: input }: (typeof cases)[number],
  { buildTable, drawsOf, parseLadder, parseTrialSettings, Trials }: Engine,
  numpy: NumpyPipeline<Figures>,
): Promise<boolean> {
  const ladder = parseLadder(input);
  const settings = parseTrialSettings({ trials, tolerancePercent: 1 });
  const { codes, cycle } = buildTable({
    schema: 1,
    name: 'measured',
    source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
    table: { length: 256, bits: 8 },
  });
  const run = () => {
    const all = new Trials(ladder, settings, { codes, cycle, range: 'bipolar' });
    all.run(trials);
    return all;
  };

  const draws = drawsOf(ladder, settings);
  const builds = Array.from({ length: trials }, () => {
    const { rungs, series, terminator } = draws.next();
    return { rungs: Array.from(rungs), series: Array.from(series), terminator };
  });
  const wanted = await numpy.open({
    bits: ladder.bits,
    span: ladder.vHigh - ladder.vLow,
    rLow: ladder.rLow,
    rHigh: ladder.rHigh,
    rungs: builds.map(({ rungs }) => rungs),
    series: builds.map(({ series }) => series),
    terminator: builds.map(({ terminator }) => terminator),
    codes: Array.from(codes),
    cycle: Array.from(cycle),
  });
  mustAgree(run().figures(), wanted);

  const own: number[] = [];
  const theirs: number[] = [];
  for (let turn = 0; turn < turns; turn += 1) {
    const ours = timeOf(run);
    const [other] = await numpy.run(1);
    if (turn < coldTurns) continue;
    own.push(ours);
    theirs.push(other);
  }
  const [ownMs, theirsMs] = [median(own), median(theirs)];
  console.log(
    `  ${trials} trials of 8 bits, ${name}: ${ownMs.toFixed(1)} ms, NumPy ${theirsMs.toFixed(1)} ms`,
  );
  const isQuick = judge('  in all', ownMs, goals.trialsMs, ' ms');
  return judge('  as a share of NumPy', ownMs / theirsMs, goals.shareOfNumpy) && isQuick;
}

function timeOf(work: () => unknown): number {
  const start = performance.now();
  work();
  return performance.now() - start;
}

/** Two programs that do not find the same are not worth timing. */
function mustAgree(figures: ReturnType<InstanceType<Engine['Trials']>['figures']>, wanted: Figures): void {
  for (const name of ['maxInl', 'maxDnl', 'sinadDb', 'unwantedDb'] as const) {
    const trial = wanted[name].findIndex((value, k) => !(Math.abs(figures[name][k] - value) < 1e-8));
    if (trial >= 0) {
      throw new Error(`${name} of build ${trial}: ${figures[name][trial]}, NumPy ${wanted[name][trial]}`);
    }
  }
  if (wanted.monotonic.some((is, k) => is !== (figures.monotonic[k] === 1)))
    throw new Error('The engine and NumPy do not agree on which builds are monotonic.');
}
