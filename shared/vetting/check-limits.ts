import type { LimitOutcome, LimitSet, Report, VettingLimit, VettingLimits } from '../contract/index.ts';

/** A table as its limits see it. */
export interface Candidate {
  readonly length: number;
  readonly bits: number;
  readonly report: Report;
}

type Rule = (candidate: Candidate) => { readonly measured: number | null; readonly isExact?: boolean };

const figureOf: Readonly<Record<VettingLimit, Rule>> = {
  minSnrDb: ({ report }) => ({ measured: report.snrDb, isExact: report.exact }),
  maxUnwantedDb: ({ report }) => ({ measured: report.unwantedDb, isExact: report.exact }),
  maxPeakErrorLsb: ({ report }) => ({ measured: report.peakErrorLsb }),
  maxTableBytes: ({ report }) => ({ measured: report.tableBytes }),
  maxMean: ({ report }) => ({ measured: Math.abs(report.mean) }),
  maxClipped: ({ report }) => ({ measured: report.clippedSamples + report.clippedCodes }),
  maxWorstToggleBits: ({ report }) => ({ measured: report.worstToggle.bits }),
  lengths: ({ length }) => ({ measured: length }),
  bits: ({ bits }) => ({ measured: bits }),
};

/** In the order in which they are shown. */
const order = Object.keys(figureOf) as VettingLimit[];

/** The limits that count for a table: the general ones first, then those of its tags in the tags' order. */
export function limitSetsFor(sets: readonly LimitSet[], tags: readonly string[]): LimitSet[] {
  const general = sets.filter(({ tag }) => tag === null);
  return [...general, ...tags.flatMap((wanted) => sets.filter(({ tag }) => tag === wanted))];
}

/**
 * How a table stands against each limit of each set. A table without any error passes limits on noise, whose figures
 * then do not exist; any other figure that does not exist fails, as nothing shows that the limit is kept.
 */
export function checkLimits(
  sets: readonly Pick<LimitSet, 'tag' | 'limits'>[],
  candidate: Candidate,
): LimitOutcome[] {
  return sets.flatMap(({ tag, limits }) =>
    order.flatMap((limit): LimitOutcome[] => {
      const allowed = limits[limit];
      if (allowed === undefined) return [];
      const { measured, isExact = false } = figureOf[limit](candidate);
      return [{ limit, tag, allowed, measured, passed: keeps(limit, allowed, measured, isExact) }];
    }),
  );
}

function keeps(
  limit: VettingLimit,
  allowed: NonNullable<VettingLimits[VettingLimit]>,
  measured: number | null,
  isExact: boolean,
): boolean {
  if (measured === null) return isExact;
  if (typeof allowed === 'object') return allowed.includes(measured);
  if (limit.startsWith('min')) return measured >= allowed;
  return measured <= allowed + (limit === 'maxPeakErrorLsb' ? snapLsb : 0);
}

/** The snap of code positions (engine specification §3.2): a tie may lie this much beyond half an LSB. */
const snapLsb = 2 ** -24;
