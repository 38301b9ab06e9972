import { limits } from './limits.ts';
import { showValue, type Problem } from './refusal.ts';

/**
 * A look at a source that has not been parsed, before the schema works through it: input made to do harm, by
 * nesting or by millions of faults, is refused here in time that grows with what is allowed. Walked with a
 * list, not by recursion, so that hostile nesting meets a refusal and not the end of the stack.
 */
export function problemsOfRawSource(source: unknown): Problem[] {
  let leaves = 0;
  let partials = 0;
  const waiting = [{ source, path: 'source', depth: 1 }];
  for (let next = waiting.pop(); next !== undefined; next = waiting.pop()) {
    const { source: here, path, depth } = next;
    if (!isFields(here)) continue;
    if (Array.isArray(here.parts)) {
      if (depth > limits.mixDepth) {
        return [
          { path: 'source', value: 'a deeper mix', allowed: `mixes nested at most ${limits.mixDepth} deep` },
        ];
      }
      here.parts.slice(0, limits.mixParts.max).forEach((part: unknown, index) => {
        if (isFields(part))
          waiting.push({ source: part.source, path: `${path}.parts[${index}].source`, depth: depth + 1 });
      });
      continue;
    }
    leaves += 1;
    if (Array.isArray(here.partials) && here.partials.length <= limits.partials.max)
      partials += here.partials.length;
    if (Array.isArray(here.values) && here.values.length <= limits.samples.max) {
      const wrong = wrongNumbers(here.values, `${path}.values`);
      if (wrong.length === limits.problemsShown) return wrong;
    }
  }
  return problemsOfSize(leaves, partials);
}

/** Rules of §1 on a source as a whole: at most 64 leaf sources and 8,192 partials. */
function problemsOfSize(leaves: number, partials: number): Problem[] {
  const problems: Problem[] = [];
  if (leaves > limits.leafSources) {
    problems.push({
      path: 'source',
      value: `${leaves} leaf sources`,
      allowed: `at most ${limits.leafSources} leaf sources in all`,
    });
  }
  if (partials > limits.partialsInAll) {
    problems.push({
      path: 'source',
      value: `${partials} partials`,
      allowed: `at most ${limits.partialsInAll} partials in all`,
    });
  }
  return problems;
}

/** The first entries of a list that are no finite numbers, as many as one refusal lists. */
function wrongNumbers(list: readonly unknown[], path: string): Problem[] {
  const problems: Problem[] = [];
  for (let i = 0; i < list.length && problems.length < limits.problemsShown; i += 1) {
    if (!Number.isFinite(list[i]))
      problems.push({ path: `${path}[${i}]`, value: showValue(list[i]), allowed: 'a finite number' });
  }
  return problems;
}

function isFields(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
