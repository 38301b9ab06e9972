import { theBench } from '../state/use-bench.ts';
import type { TypedOptions } from './render-export.ts';

export function setTarget(target: string): void {
  theBench().change((work) => ({ ...work, exporting: { ...work.exporting, target } }));
}

/** Sets options of the target in sight by hand; one that is undefined is by hand no more. */
export function setOptions(changed: TypedOptions, coalesce?: string): void {
  theBench().change(
    ({ exporting, ...work }) => {
      const { target, options } = exporting;
      const all = { ...options[target], ...changed };
      const kept = Object.fromEntries(Object.entries(all).filter(([, value]) => value !== undefined));
      return { ...work, exporting: { target, options: { ...options, [target]: kept } } };
    },
    coalesce === undefined ? undefined : { coalesce },
  );
}
