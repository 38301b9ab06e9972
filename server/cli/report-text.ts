import type { BuiltTable } from '../../shared/build-table.ts';
import { alignedBlocks, type Row } from './columns.ts';
import { onOneLine } from './terminal.ts';

/** The report for reading: a figure a line, in aligned columns. */
export function reportText(table: BuiltTable): string {
  const { definition, warnings } = table;
  const { length, bits } = definition.table;
  const title = `${onOneLine(definition.name)}: ${length} entries of ${bits} ${bits === 1 ? 'bit' : 'bits'}`;
  const lines = alignedBlocks([againstSignal(table), againstCarrier(table), ofCodes(table)]);
  const notices = warnings.map(({ path, message }) => onOneLine(`Warning: ${path}: ${message}`)).join('\n');
  return `${[title, ...lines, notices].filter(Boolean).join('\n\n')}\n`;
}

const againstSignal = ({ report }: BuiltTable): Row[] => [
  ['SNR', decimals(report.snrDb, 2), 'dB', report.exact ? 'the codes are exact' : ''],
  ['Ideal SNR', decimals(report.idealSnrDb, 2), 'dB', 'full-scale sine'],
  ['Unwanted', decimals(report.unwantedDb, 2), 'dB', 'strongest line added to strongest intended'],
  ['Peak error', decimals(report.peakErrorLsb, 4), 'LSB'],
  ['RMS error', decimals(report.rmsErrorLsb, 4), 'LSB'],
  ['Mean error', decimals(report.meanErrorLsb, 4), 'LSB'],
];

const againstCarrier = ({ report }: BuiltTable): Row[] => [
  ['SINAD', decimals(report.sinadDb, 2), 'dB'],
  ['ENOB', decimals(report.enobBits, 2), 'bits'],
  [
    'THD',
    decimals(report.thdDb, 2),
    'dB',
    report.thdPercent === null ? '' : `${decimals(report.thdPercent, 4)} %`,
  ],
  ['SFDR', decimals(report.sfdrDb, 2), 'dB'],
];

const ofCodes = ({ report, definition: { table } }: BuiltTable): Row[] => [
  ['Mean', decimals(report.mean, 6), '', 'of full scale'],
  ['RMS', decimals(report.rms, 6), '', 'of full scale'],
  ['Crest factor', decimals(report.crestFactor, 4)],
  ['Lowest code', String(report.minCode)],
  ['Highest code', String(report.maxCode)],
  ['Codes in use', String(report.usedCodes), '', `of ${2 ** table.bits}`],
  ['Clipped samples', String(report.clippedSamples)],
  ['Clipped codes', String(report.clippedCodes)],
  ['Size', String(report.tableBytes), 'bytes'],
  ['Bits changed', decimals(report.meanToggles, 4), 'bits', 'a step, on average'],
  ['Worst step', String(report.worstToggle.bits), 'bits', worstStep(report.worstToggle)],
];

const worstStep = ({ index, from, to }: BuiltTable['report']['worstToggle']) =>
  `at entry ${index}, from code ${from} to ${to}`;

const decimals = (figure: number | null, places: number) =>
  figure === null ? '-' : figure.toFixed(places).replace(/^-(0(?:\.0*)?)$/, '$1');
