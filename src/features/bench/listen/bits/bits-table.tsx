import { useId } from 'react';
import { lowestBits, type BitMask, type BitsOffFigures } from '../../../../../shared/listening/index.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { joinClasses } from '../../../../components/join-classes.ts';

export type FigureShown = 'sinad' | 'unwanted';

interface BitsTableProps {
  bits: number;
  off: BitMask;
  figures: ReadonlyMap<BitMask, BitsOffFigures>;
  shown: FigureShown;
}

/** What is left without each bit alone, and without it and all below it. */
export function BitsTable({ bits, off, figures, shown }: BitsTableProps) {
  const id = useId();
  const order = Array.from({ length: bits }, (_, i) => bits - 1 - i);
  const isSinad = shown === 'sinad';
  const cells = [...figures.values()];
  const hasOther = isSinad && cells.some(({ isOtherLine }) => isOtherLine);
  return (
    <div>
      <table className="bits-table" aria-describedby={hasOther ? id : undefined}>
        <caption>
          {isSinad ? 'SINAD in dB without each bit' : 'Strongest line added in dB without each bit'}
        </caption>
        <thead>
          <tr>
            <th scope="col">Bit</th>
            <th scope="col">off alone</th>
            <th scope="col">with all below it</th>
          </tr>
        </thead>
        <tbody>
          {order.map((bit) => (
            <tr key={bit}>
              <th scope="row">
                {bit}
                {bits > 1 && bit === bits - 1 && <span className="bits-end"> MSB</span>}
                {bits > 1 && bit === 0 && <span className="bits-end"> LSB</span>}
              </th>
              {[2 ** bit, lowestBits(bit + 1)].map((mask, column) => (
                <Cell
                  key={column}
                  figures={mask === 2 ** bits - 1 ? 'silent' : figures.get(mask)}
                  shown={shown}
                  isNow={mask === off}
                />
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      {hasOther && (
        <p id={id} className="figure-note">
          * The strongest line left is not the wave’s own: the figure is that of another tone.
        </p>
      )}
    </div>
  );
}

interface CellProps {
  figures: BitsOffFigures | 'silent' | undefined;
  shown: FigureShown;
  isNow: boolean;
}

function Cell({ figures, shown, isNow }: CellProps) {
  return (
    <td className={joinClasses(isNow && 'bits-now')}>
      {figures === undefined ? '…' : figures === 'silent' ? 'silent' : sayFigure(figures, shown)}
      {figures !== undefined && figures !== 'silent' && figures.isOtherLine && shown === 'sinad' && '*'}
      {isNow && <span className="bits-mark"> now</span>}
    </td>
  );
}

/** A figure without its unit; a dash where there is none. */
export function sayFigure({ sinadDb, unwantedDb }: BitsOffFigures, shown: FigureShown): string {
  const db = shown === 'sinad' ? sinadDb : unwantedDb;
  return formatQuantity(db, '', { decimals: 1 });
}
