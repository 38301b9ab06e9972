import type { LimitOutcome, VettingLimit, VettingLimits } from '../../shared/contract/index.ts';
import { formatQuantity } from '../../shared/quantities/index.ts';

export interface LimitWords {
  /** The figure that is held to it. */
  readonly figure: string;
  readonly bound: 'at least' | 'at most' | 'one of';
  readonly unit: string;
  /** What it is for and which figure counts, in a sentence. */
  readonly explains: string;
}

/** Every limit in the order in which they are shown. */
export const limitWords: Readonly<Record<VettingLimit, LimitWords>> = {
  minSnrDb: {
    figure: 'SNR',
    bound: 'at least',
    unit: 'dB',
    explains:
      'How far the wave stands above all that quantising changed in it. A table without any error passes.',
  },
  maxUnwantedDb: {
    figure: 'Unwanted line',
    bound: 'at most',
    unit: 'dB',
    explains:
      'The strongest line that quantising added, against the strongest of the wave: −60 keeps it a thousandth.',
  },
  maxPeakErrorLsb: {
    figure: 'Peak error',
    bound: 'at most',
    unit: 'LSB',
    explains:
      'The largest distance of a code’s value from the wave. Rounding to the nearest stays within 0.5.',
  },
  maxTableBytes: {
    figure: 'Size',
    bound: 'at most',
    unit: 'bytes',
    explains: 'What the array takes in memory.',
  },
  maxMean: {
    figure: 'Mean',
    bound: 'at most',
    unit: 'of full scale',
    explains: 'Counted without its sign. Direct current behind the converter: keep it from a loudspeaker.',
  },
  maxClipped: {
    figure: 'Clipped',
    bound: 'at most',
    unit: 'entries',
    explains: 'Samples that left the range before quantising, and codes that rounding pushed over the end.',
  },
  maxWorstToggleBits: {
    figure: 'Worst toggle',
    bound: 'at most',
    unit: 'bits',
    explains: 'The most bits that change at once from one entry to the next: a ladder glitches most there.',
  },
  lengths: {
    figure: 'Table length',
    bound: 'one of',
    unit: 'entries',
    explains: 'Numbers separated by commas or spaces, as firmware may take only some of them.',
  },
  bits: {
    figure: 'Bit depth',
    bound: 'one of',
    unit: 'bits',
    explains: 'Numbers separated by commas or spaces: the depths of the converters in use.',
  },
};

export const limitNames = Object.keys(limitWords) as VettingLimit[];

const said = (value: number) => formatQuantity(value, '', { significant: 6 });

/** `at least 48 dB`, `one of 256, 512 entries`. */
export function sayAllowed(limit: VettingLimit, allowed: NonNullable<VettingLimits[VettingLimit]>): string {
  const { bound, unit } = limitWords[limit];
  return `${bound} ${typeof allowed === 'number' ? said(allowed) : allowed.map(said).join(', ')} ${unit}`;
}

/** `SNR at least 48 dB`. */
export const sayLimit = (limit: VettingLimit, allowed: NonNullable<VettingLimits[VettingLimit]>): string =>
  `${limitWords[limit].figure} ${sayAllowed(limit, allowed)}`;

/** What was measured: `49.8 dB`; where there is no figure, why. */
export function sayMeasured({ limit, allowed, measured, passed }: LimitOutcome): string {
  if (measured === null) return passed ? 'no error at all' : 'no such figure for this wave';
  const { unit } = limitWords[limit];
  if (typeof allowed !== 'number') return `${said(measured)} ${unit}`;
  // As many digits as it takes not to belie the outcome: 0.50003 against "at most 0.5" is not shown as 0.5.
  const isLeast = limitWords[limit].bound === 'at least';
  const belies = (shown: number) => (isLeast ? shown >= allowed : shown <= allowed) !== passed;
  let digits = 4;
  while (digits < 15 && belies(Number(measured.toPrecision(digits)))) digits += 1;
  return `${formatQuantity(measured, '', { significant: Number.isInteger(measured) ? 6 : digits })} ${unit}`;
}

/** `All 4 limits are kept`, `2 of 4 limits are broken`. */
export function sayStanding(outcomes: readonly LimitOutcome[]): string {
  const failed = outcomes.filter(({ passed }) => !passed).length;
  const all = outcomes.length;
  if (all === 0) return 'The team has set no limits for this table';
  if (failed === 0) return all === 1 ? 'The one limit is kept' : `All ${all} limits are kept`;
  if (all === 1) return 'The one limit is broken';
  return `${failed} of ${all} limits ${failed === 1 ? 'is' : 'are'} broken`;
}
