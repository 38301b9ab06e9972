import { Refusal, showValue } from '../contract/index.ts';
import type { Facts } from './target.ts';

/** What templates print of storage: whether it is constant, and its boundary in bytes; `false` where none is asked for. */
export function alignmentFacts({
  storage,
  alignment,
}: {
  readonly storage: 'flash' | 'ram';
  readonly alignment: string;
}): Facts {
  return { isConst: storage === 'flash', alignment: alignment === 'none' ? false : Number(alignment) };
}

/** @throws {Refusal} where a reader that cannot be had is asked for by the definition's fold */
export function refuseFold(fold: string, target: string, because: string): void {
  if (fold === 'none') return;
  throw new Refusal({
    path: 'table.fold',
    value: showValue(fold),
    allowed: `"none" for the target ${target}${because}`,
  });
}
