import type { Ladder } from '../../shared/contract/index.ts';
import type { LadderCurrents, LadderReport } from '../../shared/output-stage/index.ts';
import { formatQuantity } from '../../shared/quantities/index.ts';
import { alignedBlocks, type Row } from './columns.ts';

/** Most codes whose voltages are listed one by one; `--json` has them all. */
const codesListed = 16;

/** A ladder's figures for reading, in aligned columns. */
export function ladderText(ladder: Ladder, report: LadderReport): string {
  const { bits, R } = ladder;
  const title = `R-2R ladder of ${bits} ${bits === 1 ? 'bit' : 'bits'}, R = ${quantity(R, 'Ω').join(' ')}`;
  const blocks = alignedBlocks([
    levelRows(report),
    currentRows('', report),
    currentRows('Shorted: ', report.shorted),
  ]);
  const caution =
    'What a pin and all pins together may carry stands in the controller’s data sheet; that comes first.';
  return `${[title, ...blocks, caution].join('\n\n')}\n`;
}

function levelRows(report: LadderReport): Row[] {
  const { volts } = report;
  const top = volts.length - 1;
  const listed =
    volts.length <= codesListed
      ? Array.from(volts, (level, code): Row => [`Code ${code}`, ...quantity(level, 'V')])
      : ([0, volts.length / 2 - 1, volts.length / 2, top] as const).map((code): Row => [
          `Code ${code}`,
          ...quantity(volts[code], 'V'),
        ]);
  return [
    ...listed,
    ['Mean step', ...quantity(report.lsbVolts, 'V'), '1 LSB between the end points'],
    ['Largest INL', report.maxInl.toFixed(4), 'LSB'],
    ['Largest DNL', report.maxDnl.toFixed(4), 'LSB'],
    [
      'Monotonic',
      report.monotonic ? 'yes' : 'no',
      '',
      report.monotonic ? '' : 'some code is no higher than the one before',
    ],
    ['Output resistance', ...quantity(report.mostOutputOhms, 'Ω')],
  ];
}

function currentRows(prefix: string, currents: LadderCurrents): Row[] {
  const { worstPin } = currents;
  const label = (text: string) => (prefix === '' ? text : `${prefix}${text.toLowerCase()}`);
  return [
    [
      label('Pin'),
      ...quantity(currents.worstPinAmps, 'A'),
      `at most, bit ${worstPin.bit} at code ${worstPin.code}`,
    ],
    [
      label('Supply'),
      ...quantity(currents.worstSupplyAmps, 'A'),
      `at most, at code ${currents.worstSupplyCode}`,
    ],
    [label('Sink'), ...quantity(currents.worstSinkAmps, 'A'), `at most, at code ${currents.worstSinkCode}`],
  ];
}

/** Number and unit apart, in plain characters: the columns of a terminal. */
function quantity(value: number, unit: string): [figure: string, unit: string] {
  const [figure, shownUnit] = formatQuantity(value, unit, { significant: 5 })
    .replace('\u2212', '-')
    .split('\u00a0');
  return [figure, shownUnit];
}
