import { sayProblem, Refusal } from '../../shared/contract/index.ts';
import { bitsOffFigures } from '../../shared/listening/bits-off.ts';
import { equallyLoud } from '../../shared/listening/equal-loudness.ts';
import { predictedLines } from '../../shared/listening/predicted-lines.ts';
import { analyseAccumulator, strongestLines } from '../../shared/playback/index.ts';
import { sizeSearch } from '../../shared/size-search/index.ts';
import type { FiguresJob, FiguresMessage } from './figures-messages.ts';

/** Progress is told this often, in milliseconds. */
const tellMs = 60;

addEventListener('message', ({ data }: MessageEvent<FiguresJob>) => {
  try {
    if (data.kind === 'accumulator') answerAccumulator(data);
    else if (data.kind === 'bits') answerBits(data);
    else if (data.kind === 'loudness') answerLoudness(data);
    else if (data.kind === 'predicted') answerPredicted(data);
    else searchSizes(data);
  } catch (error) {
    const message = error instanceof Refusal ? error.problems.map(sayProblem).join(' ') : String(error);
    tell({ kind: 'failed', message });
  }
});

function tell(message: FiguresMessage): void {
  postMessage(message);
}

function answerAccumulator({
  values,
  accumulator,
  limit,
}: Extract<FiguresJob, { kind: 'accumulator' }>): void {
  const figures = analyseAccumulator(values, accumulator);
  tell({ kind: 'accumulator', figures, lines: strongestLines(values, accumulator, limit) });
}

function answerBits({ id, coded, masks }: Extract<FiguresJob, { kind: 'bits' }>): void {
  tell({ kind: 'bits', id, figures: masks.map((off) => [off, bitsOffFigures(coded, off)] as const) });
}

function answerLoudness({
  id,
  a,
  b,
  drive,
  contextRateHz,
  everyHz,
}: Extract<FiguresJob, { kind: 'loudness' }>): void {
  const response = everyHz === null ? undefined : (hz: number) => between(everyHz, hz);
  tell({ kind: 'loudness', id, matched: equallyLoud(a, b, drive, contextRateHz, response) });
}

function answerPredicted({
  id,
  voice,
  drive,
  contextRateHz,
  most,
}: Extract<FiguresJob, { kind: 'predicted' }>): void {
  tell({ kind: 'predicted', id, lines: predictedLines(voice, drive, contextRateHz, most) });
}

/** By a straight line between two neighbours. */
function between(everyHz: Float64Array, hz: number): number {
  const below = Math.min(everyHz.length - 2, Math.floor(hz));
  return everyHz[below] + (everyHz[below + 1] - everyHz[below]) * (hz - below);
}

function searchSizes({ definition, axes }: Extract<FiguresJob, { kind: 'sizes' }>): void {
  let cells = [];
  let toldAt = performance.now();
  for (const cell of sizeSearch(definition, axes)) {
    cells.push(cell);
    if (performance.now() - toldAt < tellMs) continue;
    tell({ kind: 'cells', cells });
    cells = [];
    toldAt = performance.now();
  }
  tell({ kind: 'cells', cells });
  tell({ kind: 'done' });
}
