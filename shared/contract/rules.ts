import type { Definition } from './definition.ts';
import { showValue, type Problem } from './refusal.ts';

/** Rules of §1 that look at two fields at once; each broken one is named with the field that should change. */
export function brokenRules({ level, table }: Pick<Definition, 'level' | 'table'>): Problem[] {
  const problems: Problem[] = [];
  const refuse = (path: string, value: unknown, allowed: string) =>
    problems.push({ path, value: showValue(value), allowed });

  // One cycle fits any table, the shortest of two entries too.
  if (table.cycles > 1 && 2 * table.cycles >= table.length) {
    refuse('table.cycles', table.cycles, `fewer than half of table.length, which is ${table.length}`);
  }
  if (level.transfer !== 'none' && table.range !== 'unipolar') {
    refuse('level.transfer', level.transfer, '"none" while table.range is "bipolar"');
  }
  if (table.scale === 'mid-tread' && table.range !== 'bipolar') {
    refuse('table.scale', table.scale, '"full-span" while table.range is "unipolar"');
  }
  if (table.levels !== undefined) measuredLevelRules(table, refuse);
  if (table.fold === 'quarter') quarterFoldRules(table, refuse);
  return problems;
}

type Refuse = (path: string, value: unknown, allowed: string) => void;

function measuredLevelRules(table: Definition['table'], refuse: Refuse): void {
  const levels = table.levels ?? [];
  if (levels.length !== 2 ** table.bits) {
    refuse('table.levels', levels, `${2 ** table.bits} voltages, one for each code of ${table.bits} bits`);
  } else if (!canBeTold(levels)) {
    refuse('table.levels', levels, 'voltages from lowest to highest that differ by 1e-200 to 1e200');
  }
  const why = 'while table.levels is given';
  if (table.dither !== 'none') refuse('table.dither', table.dither, `"none" ${why}`);
  if (table.shaping !== 0) refuse('table.shaping', table.shaping, `0 ${why}`);
  if (table.scale !== 'full-span') refuse('table.scale', table.scale, `"full-span" ${why}`);
  if (table.rounding !== 'half-up') refuse('table.rounding', table.rounding, `"half-up" ${why}`);
}

/** Whether the span of voltages is far from both ends of what a double holds, so that it can be divided by. */
function canBeTold(levels: readonly number[]): boolean {
  let lowest = Infinity;
  let highest = -Infinity;
  for (const volts of levels) {
    lowest = Math.min(lowest, volts);
    highest = Math.max(highest, volts);
  }
  const span = highest - lowest;
  return span >= 1e-200 && span <= 1e200;
}

function quarterFoldRules(table: Definition['table'], refuse: Refuse): void {
  const why = 'while table.fold is "quarter"';
  if (table.sampleAt !== 'centre') refuse('table.sampleAt', table.sampleAt, `"centre" ${why}`);
  if (table.scale !== 'full-span') refuse('table.scale', table.scale, `"full-span" ${why}`);
  if (table.rounding === 'down') refuse('table.rounding', table.rounding, `"half-up" or "half-even" ${why}`);
  if (table.cycles !== 1) refuse('table.cycles', table.cycles, `1 ${why}`);
  if (table.length % 4 !== 0) refuse('table.length', table.length, `a multiple of 4 ${why}`);
}
