import type { Definition, Report } from '../contract/index.ts';
import type { Layout } from './layout.ts';
import { portMapTexts } from './port-map.ts';

/** A line of a file's comment block: what it is about and what is said of it, in ASCII. */
export interface KeyFigure {
  readonly label: string;
  readonly text: string;
}

export interface FiguresInput {
  readonly definition: Definition;
  readonly report: Report;
  /** How many words of what, and the bytes they take. */
  readonly storage: string;
  /** The least and the most of the words. */
  readonly words: { readonly min: number; readonly max: number };
  readonly layout: Layout;
  readonly engineVersion: string;
  readonly digest: string;
}

/** What a file's comment block says of its table, in order. Decibels have two decimals, whatever machine made them. */
export function keyFigures(input: FiguresInput): KeyFigure[] {
  return [...settingFigures(input), ...qualityFigures(input), ...originFigures(input)];
}

function settingFigures({ definition: { level, table }, ...input }: FiguresInput): KeyFigure[] {
  const { storage, words, layout } = input;
  const extras = [
    table.dither === 'none' ? '' : `${table.dither} dither, seed ${table.seed}`,
    table.shaping === 0 ? '' : `error feedback of order ${table.shaping}`,
    table.levels === undefined ? '' : 'measured levels',
  ].filter(Boolean);
  const figures = [
    { label: 'Length', text: `${table.length} entries, ${count(table.cycles, 'cycle')}, ${sampling(table)}` },
    { label: 'Resolution', text: `${count(table.bits, 'bit')}, ${2 ** table.bits} levels` },
    {
      label: 'Signal',
      text: `${table.range}, level ${level.level} of full scale, normalised: ${level.normalise}`,
    },
    {
      label: 'Scale',
      text: `${table.scale}, rounding ${table.rounding}${extras.map((extra) => `, ${extra}`).join('')}`,
    },
    {
      label: 'Coding',
      text: `${codingNames[table.coding]}${table.complement ? ', every code complemented' : ''}`,
    },
    {
      label: 'Words',
      text: `${words.min} to ${words.max}; ${storage}`,
    },
  ];
  if (layout.map !== undefined) {
    const { portMap, reservedPins, reservedBy } = portMapTexts(layout.map);
    figures.push({ label: 'Port map', text: portMap });
    if (reservedPins !== '') figures.push({ label: 'Reserved', text: `${reservedPins}, ${reservedBy}` });
  }
  if (table.fold === 'quarter') {
    figures.push({
      label: 'Fold',
      text: `first quarter of ${table.length} entries; a reader mirrors the rest`,
    });
  }
  return figures;
}

export const codingNames = {
  'offset-binary': 'offset binary',
  'twos-complement': "two's complement",
} as const;

const sampling = ({ sampleAt, startPhaseDeg }: Definition['table']) =>
  `taken at the ${sampleAt} of each from ${startPhaseDeg} degrees`;

function qualityFigures({ definition: { table }, report }: FiguresInput): KeyFigure[] {
  const snr = report.exact
    ? exactness(report)
    : inDecibels(report.snrDb, 'not defined for a constant signal');
  return [
    {
      label: 'SNR',
      text: `${snr} (full-scale sine of ${count(table.bits, 'bit')}: ${decimal(report.idealSnrDb, 2)} dB)`,
    },
    { label: 'SINAD', text: inDecibels(report.sinadDb, 'not defined: no carrier, or nothing beside it') },
    { label: 'ENOB', text: report.enobBits === null ? 'not defined' : `${decimal(report.enobBits, 2)} bits` },
    { label: 'THD', text: distortion(report) },
    { label: 'SFDR', text: inDecibels(report.sfdrDb, 'not defined: no carrier, or nothing beside it') },
    {
      label: 'Unwanted',
      text: `${inDecibels(report.unwantedDb, 'none')}, strongest line added to strongest intended`,
    },
    { label: 'Peak error', text: `${decimal(report.peakErrorLsb, 4)} LSB` },
    { label: 'Mean', text: `${decimal(report.mean, 6)} of full scale` },
    {
      label: 'Clipped',
      text: `${count(report.clippedSamples, 'sample')}, ${count(report.clippedCodes, 'code')}`,
    },
  ];
}

/** Codes count as exact where the error does not vary. */
const exactness = ({ peakErrorLsb }: Report) =>
  peakErrorLsb < 1e-9 ? 'no error at all' : 'no error but a constant one';

const distortion = ({ thdDb, thdPercent }: Report) =>
  thdDb === null || thdPercent === null
    ? 'no harmonic, or no carrier'
    : `${decimal(thdDb, 2)} dB, ${decimal(thdPercent, 4)} %, harmonics 2 to 10`;

const originFigures = ({ engineVersion, digest }: FiguresInput): KeyFigure[] => [
  { label: 'Engine', text: engineVersion },
  { label: 'Digest', text: `sha256 ${digest}` },
];

const inDecibels = (value: number | null, absent: string) =>
  value === null ? absent : `${decimal(value, 2)} dB`;

const count = (number: number, noun: string) => `${number} ${noun}${number === 1 ? '' : 's'}`;

/**
 * A number with so many decimals. It is first put on a grid of 10⁻⁹: a value that is a decimal tie but for the last
 * bits of sin or log10, in which engines differ, then rounds alike everywhere. Zero has no sign.
 */
export function decimal(value: number, decimals: number): string {
  const text = (Math.round(value * 1e9) / 1e9).toFixed(decimals);
  return /^-0(?:\.0*)?$/.test(text) ? text.slice(1) : text;
}
