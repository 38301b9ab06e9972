import type { Problem } from '../../../../shared/contract/index.ts';

/** What is wrong with the field at a path, in words for beside it. */
export function problemAt(problems: readonly Problem[], path: string): string | undefined {
  const problem = problems.find((one) => one.path === path);
  return problem && `${problem.value} is not allowed. Allowed: ${problem.allowed}.`;
}

/** Indices of the rows of a list that have something wrong with them. */
export function rowsAtFault(problems: readonly Problem[], list: 'partials' | 'points' | 'values'): number[] {
  const rows = new Set<number>();
  for (const { path } of problems) {
    const found = /^source\.(partials|points|values)\[(\d+)\]/.exec(path);
    if (found?.[1] === list) rows.add(Number(found[2]));
  }
  return [...rows].sort((one, other) => one - other);
}
