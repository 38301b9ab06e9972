import type { HarmonicsSource, TableSettings, Warning } from '../contract/index.ts';
import { addHarmonics, type HarmonicLine } from './harmonic-sum.ts';

const warningsSpelledOut = 8;

/** Whether a harmonic fits the table: `2·n·K < N`. */
export function fitsTable(
  harmonic: number,
  { length, cycles }: Pick<TableSettings, 'length' | 'cycles'>,
): boolean {
  return 2 * harmonic * cycles < length;
}

/** A sum of partials at the table's phases. What does not fit the table is left out and named in `warnings`. */
export function harmonicsCycle(
  source: HarmonicsSource,
  table: TableSettings,
  path: string,
  warnings: Warning[],
): Float64Array {
  const cycle = new Float64Array(table.length).fill(source.offset);
  const lines: HarmonicLine[] = [];
  const leftOut: { harmonic: number; index: number }[] = [];
  source.partials.forEach(({ harmonic, amplitude, phaseDeg }, index) => {
    if (!fitsTable(harmonic, table)) {
      leftOut.push({ harmonic, index });
      return;
    }
    const phase = ((phaseDeg % 360) * Math.PI) / 180;
    lines.push({ harmonic, sine: amplitude * Math.cos(phase), cosine: amplitude * Math.sin(phase) });
  });
  if (leftOut.length > 0) warnings.push(...warningsOf(leftOut, table, path));
  addHarmonics(cycle, lines, table);
  return cycle;
}

function warningsOf(
  leftOut: readonly { harmonic: number; index: number }[],
  { length, cycles }: TableSettings,
  path: string,
): Warning[] {
  const cyclesText = cycles === 1 ? '' : ` with ${cycles} cycles`;
  const reason = `a table of ${length} entries${cyclesText} holds harmonics below ${length / (2 * cycles)}.`;
  const warnings: Warning[] = leftOut.slice(0, warningsSpelledOut).map(({ harmonic, index }) => ({
    code: 'partial-above-nyquist',
    path: `${path}.partials[${index}].harmonic`,
    message: `Harmonic ${harmonic} is left out: ${reason}`,
  }));
  const others = leftOut.slice(warningsSpelledOut).map(({ harmonic }) => harmonic);
  if (others.length > 0) {
    warnings.push({
      code: 'partial-above-nyquist',
      path: `${path}.partials`,
      message: `${others.length} more are left out, harmonics ${runsOf(others)}: ${reason}`,
    });
  }
  return warnings;
}

/** Whole numbers in few words: `16–20, 22`. */
function runsOf(numbers: readonly number[]): string {
  const runs: { first: number; last: number }[] = [];
  for (const number of [...numbers].sort((a, b) => a - b)) {
    const run = runs.at(-1);
    if (run !== undefined && number <= run.last + 1) run.last = number;
    else runs.push({ first: number, last: number });
  }
  return runs.map(({ first, last }) => (first === last ? `${first}` : `${first}–${last}`)).join(', ');
}
