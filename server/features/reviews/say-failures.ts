import type { LimitOutcome } from '../../../shared/contract/index.ts';

/** Enough for a person to recognise the figure; the outcome itself has all digits. */
const rounded = (value: number) => String(Number(value.toPrecision(6)));

/** Failed limits in words: `minSnrDb is 49.93, allowed at least 60`. */
export const sayFailures = (failures: readonly LimitOutcome[]): string => failures.map(say).join('; ');

function say({ limit, tag, allowed, measured }: LimitOutcome): string {
  const found = measured === null ? 'does not exist' : `is ${rounded(measured)}`;
  const whose = tag === null ? '' : ` (tag ${tag})`;
  return `${limit} ${found}, allowed ${bound(limit, allowed)}${whose}`;
}

function bound(limit: string, allowed: LimitOutcome['allowed']): string {
  if (typeof allowed === 'object') return `one of ${allowed.join(', ')}`;
  return `${limit.startsWith('min') ? 'at least' : 'at most'} ${allowed}`;
}
