import type { BuiltTable } from '../../shared/build-table.ts';
import type { Accumulator, AccumulatorFigures } from '../../shared/playback/index.ts';
import { alignedBlocks, type Row } from './columns.ts';
import { onOneLine } from './terminal.ts';

/** What a phase accumulator makes of a table, for reading, in aligned columns. */
export function spursText(
  { definition, warnings }: BuiltTable,
  { accumulatorBits, stepWord }: Accumulator,
  figures: AccumulatorFigures,
): string {
  const { length, bits } = definition.table;
  const title =
    `${onOneLine(definition.name)}: ${length} entries of ${bits} ${bits === 1 ? 'bit' : 'bits'}, ` +
    `accumulator of ${accumulatorBits} bits, step word ${stepWord}`;
  const notices = warnings.map(({ path, message }) => onOneLine(`Warning: ${path}: ${message}`)).join('\n');
  const bins = `Bin b stands at b/${figures.period} of the sample rate.`;
  return `${[title, ...alignedBlocks([rowsOf(figures)]), bins, notices].filter(Boolean).join('\n\n')}\n`;
}

function rowsOf(figures: AccumulatorFigures): Row[] {
  const { period, carrierBin, worstOtherDbc, worstOtherBin, worstTruncationDbc, worstTruncationBin } =
    figures;
  const truncates = worstTruncationBin !== null || carrierBin === null;
  return [
    ['Period', String(period), 'samples'],
    ['Carrier', '', '', carrierBin === null ? 'there is no line' : `bin ${carrierBin}`],
    ['Worst other line', decibels(worstOtherDbc), 'dBc', binText(worstOtherBin)],
    [
      'Worst of truncation',
      decibels(worstTruncationDbc),
      'dBc',
      truncates ? binText(worstTruncationBin) : 'the index loses nothing of the phase',
    ],
    ['SNR', decibels(figures.snrDb), 'dB', 'carrier over all other lines, DC left out'],
  ];
}

const binText = (bin: number | null) => (bin === null ? '' : `bin ${bin}`);
const decibels = (figure: number | null) => (figure === null ? '-' : figure.toFixed(2));
