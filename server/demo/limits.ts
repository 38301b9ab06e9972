import type { CreateLimitSet } from '../../shared/contract/index.ts';

/**
 * What the made-up team asks of its tables. Figures chosen for this demonstration, no source: what an alarm has to be is
 * for the applicable standard and a qualified engineer to decide.
 */
export const demoLimits: readonly CreateLimitSet[] = [
  { tag: null, limits: { minSnrDb: 36, maxPeakErrorLsb: 0.5, maxTableBytes: 512, maxClipped: 0 } },
  { tag: 'alarm', limits: { minSnrDb: 40, maxMean: 0.01, bits: [6, 7, 8] } },
];
