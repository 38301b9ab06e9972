import type { Definition, Source } from './definition.ts';
import { limits } from './limits.ts';
import { showValue, type Problem } from './refusal.ts';

/** Walks a source and everything mixed into it, outermost first. */
function* sourcesWithin(source: Source): Generator<Source> {
  yield source;
  if (source.kind === 'mix') for (const part of source.parts) yield* sourcesWithin(part.source);
}

/** Rules of §1 that look at two fields at once; each broken one is named with the field that should change. */
export function brokenRules({ source, level, table }: Definition): Problem[] {
  const problems: Problem[] = [];
  const refuse = (path: string, value: unknown, allowed: string) =>
    problems.push({ path, value: showValue(value), allowed });

  if (2 * table.cycles >= table.length) {
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

  let leaves = 0;
  let partials = 0;
  for (const part of sourcesWithin(source)) {
    if (part.kind !== 'mix') leaves += 1;
    if (part.kind === 'harmonics') partials += part.partials.length;
  }
  if (leaves > limits.leafSources) {
    refuse('source', `${leaves} leaf sources`, `at most ${limits.leafSources} leaf sources in all`);
  }
  if (partials > limits.partialsInAll) {
    refuse('source', `${partials} partials`, `at most ${limits.partialsInAll} partials in all`);
  }
  return problems;
}

type Refuse = (path: string, value: unknown, allowed: string) => void;

function measuredLevelRules(table: Definition['table'], refuse: Refuse): void {
  const levels = table.levels ?? [];
  if (levels.length !== 2 ** table.bits) {
    refuse('table.levels', levels, `${2 ** table.bits} voltages, one for each code of ${table.bits} bits`);
  } else if (levels.every((volts) => volts === levels[0])) {
    refuse('table.levels', levels, 'at least two different voltages');
  }
  const why = 'while table.levels is given';
  if (table.dither !== 'none') refuse('table.dither', table.dither, `"none" ${why}`);
  if (table.shaping !== 0) refuse('table.shaping', table.shaping, `0 ${why}`);
  if (table.scale !== 'full-span') refuse('table.scale', table.scale, `"full-span" ${why}`);
  if (table.rounding !== 'half-up') refuse('table.rounding', table.rounding, `"half-up" ${why}`);
}

function quarterFoldRules(table: Definition['table'], refuse: Refuse): void {
  const why = 'while table.fold is "quarter"';
  if (table.sampleAt !== 'centre') refuse('table.sampleAt', table.sampleAt, `"centre" ${why}`);
  if (table.scale !== 'full-span') refuse('table.scale', table.scale, `"full-span" ${why}`);
  if (table.rounding === 'down') refuse('table.rounding', table.rounding, `"half-up" or "half-even" ${why}`);
  if (table.cycles !== 1) refuse('table.cycles', table.cycles, `1 ${why}`);
  if (table.length % 4 !== 0) refuse('table.length', table.length, `a multiple of 4 ${why}`);
}

/**
 * Depth of nested mixes in input that has not been parsed. Counted with a list, not by recursion, so that
 * hostile nesting meets a refusal and not the end of the stack.
 */
export function mixDepthOf(source: unknown): number {
  let deepest = 0;
  const waiting: { source: unknown; depth: number }[] = [{ source, depth: 1 }];
  for (let next = waiting.pop(); next !== undefined; next = waiting.pop()) {
    const { source: here, depth } = next;
    if (typeof here !== 'object' || here === null || !('parts' in here) || !Array.isArray(here.parts)) continue;
    deepest = Math.max(deepest, depth);
    if (deepest > limits.mixDepth) return deepest;
    for (const part of here.parts as unknown[]) {
      if (typeof part === 'object' && part !== null && 'source' in part) {
        waiting.push({ source: part.source, depth: depth + 1 });
      }
    }
  }
  return deepest;
}
