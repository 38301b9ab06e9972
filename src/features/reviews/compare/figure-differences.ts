import type { Definition, Report } from '../../../../shared/contract/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';

export type Judgement = 'better' | 'worse' | 'same' | 'other';

/** One figure of both tables, for reading. */
export interface FigureDifference {
  /** As the figures of the bench are called, so that its explanation can stand here too. */
  readonly id: string;
  readonly label: string;
  /** Unit of all three; empty for a ratio. */
  readonly unit: string;
  readonly before: string;
  readonly after: string;
  /** With its sign; empty where there is none to tell. */
  readonly difference: string;
  /** `other`: it differs, and neither is better of itself. */
  readonly judgement: Judgement;
}

interface Row {
  readonly id: string;
  readonly label: string;
  readonly unit: string;
  readonly decimals?: number;
  readonly of: (report: Report) => number | null;
  /** Which way is better: more, less, nearer to zero, or neither. */
  readonly better: 'more' | 'less' | 'nearer' | 'neither';
  /** Counts the wave's own partials as distortion, so that it judges single sines only. */
  readonly forSines?: boolean;
}

/** An exact table has no noise to measure, and so more than any SNR. */
const snrOf = ({ snrDb, exact }: Report) => (snrDb === null && exact ? Infinity : snrDb);
const unwantedOf = ({ unwantedDb, exact }: Report) => (unwantedDb === null && exact ? -Infinity : unwantedDb);

const rows: readonly Row[] = [
  { id: 'snrDb', label: 'SNR', unit: 'dB', decimals: 1, of: snrOf, better: 'more' },
  { id: 'unwantedDb', label: 'Unwanted line', unit: 'dB', decimals: 1, of: unwantedOf, better: 'less' },
  { id: 'peakErrorLsb', label: 'Peak error', unit: 'LSB', of: (r) => r.peakErrorLsb, better: 'less' },
  { id: 'rmsErrorLsb', label: 'RMS error', unit: 'LSB', of: (r) => r.rmsErrorLsb, better: 'less' },
  { id: 'meanErrorLsb', label: 'Mean error', unit: 'LSB', of: (r) => r.meanErrorLsb, better: 'nearer' },
  {
    id: 'clipped',
    label: 'Clipped',
    unit: 'entries',
    of: (r) => r.clippedSamples + r.clippedCodes,
    better: 'less',
  },
  {
    id: 'sinadDb',
    label: 'SINAD',
    unit: 'dB',
    decimals: 1,
    of: (r) => r.sinadDb,
    better: 'more',
    forSines: true,
  },
  {
    id: 'enobBits',
    label: 'ENOB',
    unit: 'bits',
    decimals: 2,
    of: (r) => r.enobBits,
    better: 'more',
    forSines: true,
  },
  { id: 'thdDb', label: 'THD', unit: 'dB', decimals: 1, of: (r) => r.thdDb, better: 'less', forSines: true },
  {
    id: 'sfdrDb',
    label: 'SFDR',
    unit: 'dB',
    decimals: 1,
    of: (r) => r.sfdrDb,
    better: 'more',
    forSines: true,
  },
  { id: 'mean', label: 'Mean', unit: 'FS', of: (r) => r.mean, better: 'neither' },
  { id: 'rms', label: 'RMS', unit: 'FS', of: (r) => r.rms, better: 'neither' },
  { id: 'crestFactor', label: 'Crest factor', unit: '', of: (r) => r.crestFactor, better: 'neither' },
  { id: 'usedCodes', label: 'Codes used', unit: 'codes', of: (r) => r.usedCodes, better: 'neither' },
  { id: 'tableBytes', label: 'Size', unit: 'bytes', of: (r) => r.tableBytes, better: 'less' },
  { id: 'meanToggles', label: 'Mean toggles', unit: 'bits a step', of: (r) => r.meanToggles, better: 'less' },
  { id: 'worstToggle', label: 'Worst toggle', unit: 'bits', of: (r) => r.worstToggle.bits, better: 'less' },
];

interface Measured {
  readonly definition: Definition;
  readonly report: Report;
}

/** Every figure of the report, before and after, with the difference and whether that is better. */
export function compareFigures(before: Measured, after: Measured): FigureDifference[] {
  const areSines = isSine(before.definition) && isSine(after.definition);
  return rows.map((row) => {
    const [old, fresh] = [row.of(before.report), row.of(after.report)];
    return {
      id: row.id,
      label: row.label,
      unit: row.unit,
      before: say(row, old),
      after: say(row, fresh),
      difference: sayDifference(row, old, fresh),
      judgement: judge(row, old, fresh, areSines),
    };
  });
}

/** Whether a wave has one partial and no other, so that all else in its spectrum is unwanted. */
function isSine({ source }: Definition): boolean {
  return (
    source.kind === 'harmonics' && source.partials.filter(({ amplitude }) => amplitude !== 0).length === 1
  );
}

function judge(
  { better, forSines = false }: Row,
  before: number | null,
  after: number | null,
  areSines: boolean,
): Judgement {
  if (before === after) return 'same';
  if (before === null || after === null) return 'other';
  if (Math.abs(after - before) < leastShown) return 'same';
  if (better === 'neither' || (forSines && !areSines)) return 'other';
  const gain = { more: after - before, less: before - after, nearer: Math.abs(before) - Math.abs(after) }[
    better
  ];
  return gain > 0 ? 'better' : gain < 0 ? 'worse' : 'other';
}

/** What computing alone leaves where a figure is zero. */
const leastShown = 1e-9;

function say(row: Row, value: number | null): string {
  if (value === null) return '–';
  if (!Number.isFinite(value)) return 'exact';
  return format(row, Math.abs(value) < leastShown ? 0 : value);
}

/** A count, as of bytes, is told to the last one. */
function format({ decimals }: Row, value: number): string {
  if (decimals !== undefined) return formatQuantity(value, '', { decimals });
  return formatQuantity(value, '', { significant: Number.isInteger(value) ? 9 : 3 });
}

function sayDifference(row: Row, before: number | null, after: number | null): string {
  if (before === null || after === null) return '';
  const difference = after - before;
  if (!Number.isFinite(difference)) return '';
  if (Math.abs(difference) < leastShown) return '0';
  return `${difference > 0 ? '+' : '−'}${format(row, Math.abs(difference))}`;
}
