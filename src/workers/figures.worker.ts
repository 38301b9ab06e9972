import { sayProblem, Refusal } from '../../shared/contract/index.ts';
import { analyseAccumulator, strongestLines } from '../../shared/playback/index.ts';
import { sizeSearch } from '../../shared/size-search/index.ts';
import type { FiguresJob, FiguresMessage } from './figures-messages.ts';

/** Progress is told this often, in milliseconds. */
const tellMs = 60;

addEventListener('message', ({ data }: MessageEvent<FiguresJob>) => {
  try {
    if (data.kind === 'accumulator') answerAccumulator(data);
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
