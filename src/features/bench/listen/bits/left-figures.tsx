import type { BitsOffFigures } from '../../../../../shared/listening/index.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { Figure, FigureStrip } from '../../../../components/index.ts';
import { sayFigure } from './bits-table.tsx';

interface LeftFiguresProps {
  figures: BitsOffFigures | undefined;
  /** With all bits on. */
  all: BitsOffFigures | undefined;
  /** Which bits are off. */
  says: string;
}

/** SINAD and the strongest added line of what is left, and what they are with all bits on. */
export function LeftFigures({ figures, all, says }: LeftFiguresProps) {
  const isWhole = figures === all;
  const beside = (db: number | null | undefined) =>
    isWhole || db === undefined || db === null
      ? ''
      : ` (${formatQuantity(db, 'dB', { decimals: 1 })} with all bits on)`;
  return (
    <>
      <FigureStrip label="Figures with these bits off">
        <Figure
          label="SINAD left"
          value={figures === undefined ? '…' : sayFigure(figures, 'sinad')}
          unit="dB"
          explain={
            <>
              <p>
                Power of the strongest line over that of all other lines of the table, DC left out, with{' '}
                {says}. The codes lose their bits before anything is computed.
              </p>
              <p>Higher is better. Of a single tone each bit is worth 6.02 dB.</p>
            </>
          }
        />
        <Figure
          label="Strongest line added"
          value={figures === undefined ? '…' : sayFigure(figures, 'unwanted')}
          unit="dB"
          explain={
            <>
              <p>
                <code>20·log10(max A(e)/max A(r))</code>: the strongest line of the error against the
                strongest of the wave before it was quantised, DC left out, with {says}.
              </p>
              <p>Lower is better. Waves of several partials are judged by this, not by SINAD.</p>
            </>
          }
        />
      </FigureStrip>
      <p role="status" className="field-description">
        {figures === undefined
          ? 'Computing the figures…'
          : `With ${says}: SINAD ${say(figures.sinadDb)}${beside(all?.sinadDb)}, strongest line added ${say(figures.unwantedDb)}${beside(all?.unwantedDb)}.`}
        {figures?.isOtherLine && ' The strongest line left is not the wave’s own.'}
      </p>
    </>
  );
}

const say = (db: number | null) => (db === null ? 'none' : formatQuantity(db, 'dB', { decimals: 1 }));
