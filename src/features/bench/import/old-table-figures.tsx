import type { OldTableReport } from '../../../../shared/imports/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Explain } from '../../../components/index.ts';

interface Row {
  readonly title: string;
  readonly explain: string;
  readonly say: (report: OldTableReport) => string;
}

const dB = (value: number | null) =>
  value === null ? 'nothing left' : formatQuantity(value, 'dB', { decimals: 1 });

const rows: readonly Row[] = [
  {
    title: 'Bits really used',
    explain:
      'The smallest depth that holds every entry, low bits that are 0 throughout left aside. Stored beside it: the bits of the words.',
    say: ({ bits, wordBits, idleLowBits }) =>
      `${bits} of ${wordBits}${idleLowBits > 0 ? `, ${idleLowBits} low bits idle` : ''}`,
  },
  {
    title: 'Lost codes',
    explain:
      'Codes of that depth beyond the lowest and the highest entry: range that the converter has and the table leaves.',
    say: ({ lostCodes, bits }) => `${lostCodes} of ${2 ** bits}`,
  },
  {
    title: 'Last entry repeats the first',
    explain:
      'A table that was made over one entry too few: each turn of the loop then stands still for one entry. Told by whether one entry less is told better by its harmonics.',
    say: ({ repeatsFirst }) => (repeatsFirst ? 'yes' : 'no'),
  },
  {
    title: 'DC',
    explain: 'Mean of the entries less the middle of the range, in LSB. Good is 0 for a signal without DC.',
    say: ({ dcLsb }) => formatQuantity(dcLsb, 'LSB', { decimals: 2 }),
  },
  {
    title: 'Step at the seam',
    explain:
      'From the last entry to the first, in codes, beside the largest step within. Good is no larger than that.',
    say: ({ seam }) => `${seam.step} (within: ${seam.largestWithin})`,
  },
  {
    title: 'SNR against its harmonics',
    explain:
      'Power of the harmonics that best tell the table (by Schwarz’s criterion, 1978) over what is left beside them. An even rounding of a full sine leaves 6.02 dB a bit and 1.76.',
    say: ({ snrDb, harmonics }) => `${dB(snrDb)}, ${harmonics} ${harmonics === 1 ? 'harmonic' : 'harmonics'}`,
  },
];

interface OldTableFiguresProps {
  before: OldTableReport;
  after: OldTableReport | null;
}

/** Figures of an old table, and of the better one beside them. */
export function OldTableFigures({ before, after }: OldTableFiguresProps) {
  return (
    <table className="import-figures">
      <caption className="sr-only">Figures of the table{after ? ', old and better' : ''}</caption>
      <thead>
        <tr>
          <th scope="col">{before.length.toLocaleString('en')} entries</th>
          <th scope="col">As it is</th>
          {after && <th scope="col">Better</th>}
        </tr>
      </thead>
      <tbody>
        {rows.map(({ title, explain, say }) => (
          <tr key={title}>
            <th scope="row">
              {title} <Explain title={title}>{explain}</Explain>
            </th>
            <td>{say(before)}</td>
            {after && <td>{say(after)}</td>}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
