import type { HarmonicsSource, TableSettings, Warning } from '../contract/index.ts';
import { addSines, type Sine } from './harmonic-sum.ts';

const warningsSpelledOut = 8;

/** Whether a harmonic fits the table: `2·n·K < N`. */
export function fitsTable(harmonic: number, { length, cycles }: Pick<TableSettings, 'length' | 'cycles'>): boolean {
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
  const sines: Sine[] = [];
  let leftOut = 0;
  source.partials.forEach(({ harmonic, amplitude, phaseDeg }, index) => {
    if (fitsTable(harmonic, table)) {
      sines.push({ harmonic, amplitude, phaseRad: ((phaseDeg % 360) * Math.PI) / 180 });
      return;
    }
    leftOut += 1;
    if (leftOut > warningsSpelledOut) return;
    const cyclesText = table.cycles === 1 ? '' : ` with ${table.cycles} cycles`;
    warnings.push({
      code: 'partial-above-nyquist',
      path: `${path}.partials[${index}].harmonic`,
      message: `Harmonic ${harmonic} is left out: a table of ${table.length} entries${cyclesText} holds harmonics below ${table.length / (2 * table.cycles)}.`,
    });
  });
  if (leftOut > warningsSpelledOut) {
    warnings.push({
      code: 'partial-above-nyquist',
      path: `${path}.partials`,
      message: `${leftOut - warningsSpelledOut} more partials are left out for the same reason.`,
    });
  }
  addSines(cycle, sines, table);
  return cycle;
}
