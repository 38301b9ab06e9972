import { createContext, useContext } from 'react';
import type { Problem } from '../../../../shared/contract/index.ts';

/** Path of the source that an editor works on: `source`, or that of a part of a mix. */
export const SourcePath = createContext('source');

/** Says the path of a field of the source that is edited: `.partials[2]` behind the source's own. */
export function usePathTo(): (field: string) => string {
  const source = useContext(SourcePath);
  return (field) => `${source}${field}`;
}

/** What is wrong with the source at a path, as if it were the only one: its editor knows of no other. */
export function problemsUnder(problems: readonly Problem[], path: string): Problem[] {
  return problems
    .filter((problem) => problem.path === path || /^[.[]/.test(tailOf(problem, path)))
    .map((problem) => ({ ...problem, path: `source${tailOf(problem, path)}` }));
}

function tailOf({ path }: Problem, head: string): string {
  return path.startsWith(head) ? path.slice(head.length) : '';
}
