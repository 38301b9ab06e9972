import type { DefinitionInput } from '../../shared/contract/index.ts';
import { bundleModule } from './bundle-module.ts';
import { judge, median } from './judge.ts';
import { NumpyPipeline } from './numpy-pipeline.ts';
import type * as playbackEntry from './playback-entry.ts';

type Engine = typeof playbackEntry;
type Cells = ReturnType<typeof searched>;
type SizeFigures = Record<'snrDb' | 'unwantedDb' | 'tableBytes', number[][]>;

/** Searches in one turn. */
const runs = 4;
const turns = 25;
/** Turns that only warm both sides up. */
const coldTurns = 6;
const goals = { searchMs: 60, shareOfNumpy: 1, accumulatorMs: 50 };

const definition: DefinitionInput = {
  schema: 1,
  name: 'measured',
  source: {
    kind: 'harmonics',
    offset: 0,
    partials: Array.from({ length: 32 }, (_, i) => ({
      harmonic: i + 1,
      amplitude: 1 / (i + 1),
      phaseDeg: (i * 37) % 360,
    })),
  },
};

/**
 * A search over 10 lengths and 16 depths beside the same in vectorised NumPy, results compared before times; and what
 * an accumulator of 48 bits makes of the longest table.
 */
export async function measurePlayback(): Promise<boolean> {
  const bundle = await bundleModule(new URL('playback-entry.ts', import.meta.url), 'playback');
  const engine = (await import(bundle)) as Engine;
  const numpy = new NumpyPipeline<SizeFigures>('sizes.py');
  try {
    const isFast = await measureSearch(engine, numpy);
    return measureAccumulators(engine) && isFast;
  } finally {
    numpy.close();
  }
}

const searched = ({ parseDefinition, sizeSearch }: Engine) => [...sizeSearch(parseDefinition(definition))];

async function measureSearch(engine: Engine, numpy: NumpyPipeline<SizeFigures>): Promise<boolean> {
  const { lengths, bits } = engine.usualAxes;
  mustAgree(searched(engine), await numpy.open({ definition, lengths, bits }), bits.length);
  const own: number[] = [];
  const theirs: number[] = [];
  for (let turn = 0; turn < turns; turn += 1) {
    const ours = Array.from({ length: runs }, () => timeOf(() => searched(engine)));
    const other = await numpy.run(runs);
    if (turn < coldTurns) continue;
    own.push(...ours);
    theirs.push(...other);
  }
  const [ownMs, theirsMs] = [median(own), median(theirs)];
  console.log(`  ${lengths.length} lengths × ${bits.length} depths; NumPy ${theirsMs.toFixed(2)} ms`);
  const isFast = judge('  search', ownMs, goals.searchMs, ' ms');
  return judge('  as a share of NumPy', ownMs / theirsMs, goals.shareOfNumpy) && isFast;
}

function measureAccumulators({ buildTable, analyseAccumulator, strongestLines }: Engine): boolean {
  const met = [256, 65_536].map((length) => {
    const { values } = buildTable({ ...definition, table: { length, bits: 16 } });
    const times: number[] = [];
    for (let i = 0; i < 30; i += 1) {
      // Another step each time, odd, so that the period is 2^48.
      const accumulator = { accumulatorBits: 48, stepWord: 123_456_789_012_345 + 2 * i };
      times.push(
        timeOf(() => {
          analyseAccumulator(values, accumulator);
          strongestLines(values, accumulator, 1024);
        }),
      );
    }
    const what = `48-bit accumulator over ${length} entries, figures and 1024 lines`;
    return judge(what, median(times), goals.accumulatorMs, ' ms');
  });
  return met.every(Boolean);
}

function timeOf(work: () => unknown): number {
  const start = performance.now();
  work();
  return performance.now() - start;
}

/** Two programs that do not give the same figures are not worth timing. */
function mustAgree(cells: Cells, wanted: SizeFigures, depths: number): void {
  const faults = cells.flatMap((cell, i) => {
    const [row, column] = [Math.floor(i / depths), i % depths];
    return (['snrDb', 'unwantedDb', 'tableBytes'] as const).flatMap((figure) => {
      const value = wanted[figure][row][column];
      const told = cell[figure];
      return told !== null && Math.abs(told - value) <= 1e-6
        ? []
        : [`${figure} of ${cell.tableLength}×${cell.bits}: ${told}, NumPy ${value}`];
    });
  });
  if (faults.length > 0) throw new Error(`The search and NumPy do not agree: ${faults.join('; ')}`);
}
