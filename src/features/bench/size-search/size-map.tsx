import { useRef, useState, type KeyboardEvent } from 'react';
import type { SizeAxes, SizeCell } from '../../../../shared/size-search/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';

export type MapFigure = 'snrDb' | 'unwantedDb' | 'tableBytes';

interface SizeMapProps {
  axes: SizeAxes;
  cells: readonly SizeCell[];
  figure: MapFigure;
  isMet: (cell: SizeCell) => boolean;
  /** The smallest that keeps the limits, and the size on the bench. */
  smallest: SizeCell | null;
  current: { tableLength: number; bits: number };
  onTake: (cell: SizeCell) => void;
}

/** Depths across, lengths down, a figure in each cell; arrow keys walk, Enter takes. */
export function SizeMapGrid({ axes, cells, figure, isMet, smallest, current, onTake }: SizeMapProps) {
  const [at, setAt] = useState({
    row: axes.lengths.indexOf(current.tableLength),
    column: axes.bits.indexOf(current.bits),
  });
  const grid = useRef<HTMLTableElement>(null);
  const byPlace = new Map(cells.map((cell) => [`${cell.tableLength} ${cell.bits}`, cell]));
  const range = rangeOf(cells, figure);
  const stop = { row: Math.max(0, at.row), column: Math.max(0, at.column) };
  const told = byPlace.get(`${axes.lengths[stop.row]} ${axes.bits[stop.column]}`);

  const walk = (event: KeyboardEvent) => {
    const { row, column } = stop;
    const goal = {
      ArrowRight: { row, column: column + 1 },
      ArrowLeft: { row, column: column - 1 },
      ArrowDown: { row: row + 1, column },
      ArrowUp: { row: row - 1, column },
      Home: { row, column: 0 },
      End: { row, column: axes.bits.length - 1 },
      PageUp: { row: 0, column },
      PageDown: { row: axes.lengths.length - 1, column },
    }[event.key];
    if (goal === undefined || axes.lengths[goal.row] === undefined || axes.bits[goal.column] === undefined)
      return;
    event.preventDefault();
    setAt(goal);
    grid.current?.querySelector<HTMLElement>(`[data-at="${goal.row} ${goal.column}"]`)?.focus();
  };

  return (
    <div className="size-map">
      <div className="size-scroll">
        <table ref={grid} role="grid" aria-label="Sizes: depth across, length down" onKeyDown={walk}>
          <thead>
            <tr>
              <th scope="col">
                <span className="sr-only">Entries</span>
              </th>
              {axes.bits.map((bits) => (
                <th key={bits} scope="col">
                  {bits}
                  <span className="sr-only"> bits</span>
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {axes.lengths.map((tableLength, row) => (
              <tr key={tableLength}>
                <th scope="row">{tableLength}</th>
                {axes.bits.map((bits, column) => {
                  const cell = byPlace.get(`${tableLength} ${bits}`);
                  const isSmallest = cell !== undefined && cell === smallest;
                  const isCurrent = tableLength === current.tableLength && bits === current.bits;
                  return (
                    <td key={bits} role="gridcell">
                      <button
                        type="button"
                        tabIndex={row === stop.row && column === stop.column ? 0 : -1}
                        data-at={`${row} ${column}`}
                        data-met={cell !== undefined && isMet(cell) ? '' : undefined}
                        data-smallest={isSmallest ? '' : undefined}
                        data-current={isCurrent ? '' : undefined}
                        className="size-cell"
                        style={{ '--share': shareOf(cell, figure, range) } as React.CSSProperties}
                        aria-label={
                          cell === undefined
                            ? `${tableLength} entries of ${bits} bits, not searched yet`
                            : `${sayCell(cell)}${isSmallest ? ', the smallest that keeps the limits' : ''}${isCurrent ? ', on the bench' : ''}`
                        }
                        onFocus={() => setAt({ row, column })}
                        onPointerEnter={() => setAt({ row, column })}
                        onClick={() => {
                          if (cell !== undefined && cell.problem === null) onTake(cell);
                        }}
                      >
                        {shown(cell, figure)}
                      </button>
                    </td>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <p className="size-told">
        {told === undefined
          ? 'Point at a cell, or walk with the arrow keys; a press takes it.'
          : `${sayCell(told)}.`}
      </p>
    </div>
  );
}

/** A cell in words: `256 entries of 8 bits: SNR 49.9 dB, unwanted −61.2 dB, 256 bytes`. */
export function sayCell({
  tableLength,
  bits,
  snrDb,
  unwantedDb,
  exact,
  tableBytes,
  problem,
}: SizeCell): string {
  const size = `${tableLength.toLocaleString('en')} entries of ${bits} ${bits === 1 ? 'bit' : 'bits'}`;
  if (problem !== null) return `${size}: refused, allowed is ${problem.allowed}`;
  const db = (value: number | null) => formatQuantity(value, 'dB', { decimals: 1 });
  const figures = exact ? 'exact' : `SNR ${db(snrDb)}, unwanted ${db(unwantedDb)}`;
  return `${size}: ${figures}, ${tableBytes.toLocaleString('en')} bytes`;
}

function valueOf(cell: SizeCell, figure: MapFigure): number | null {
  return figure === 'tableBytes' ? Math.log2(cell.tableBytes) : cell[figure];
}

function rangeOf(cells: readonly SizeCell[], figure: MapFigure): [number, number] {
  let range: [number, number] = [Infinity, -Infinity];
  for (const cell of cells) {
    const value = cell.problem === null ? valueOf(cell, figure) : null;
    if (value !== null) range = [Math.min(range[0], value), Math.max(range[1], value)];
  }
  return range;
}

/** How good a cell is among those found, 0…1: the fuller the water, the better. */
function shareOf(cell: SizeCell | undefined, figure: MapFigure, [least, most]: [number, number]): number {
  if (cell === undefined || cell.problem !== null) return 0;
  if (cell.exact && figure !== 'tableBytes') return 1;
  const value = valueOf(cell, figure);
  if (value === null || !(most > least)) return 0;
  const share = (value - least) / (most - least);
  return Number((figure === 'snrDb' ? share : 1 - share).toFixed(3));
}

function shown(cell: SizeCell | undefined, figure: MapFigure): string {
  if (cell === undefined) return '';
  if (cell.problem !== null) return '×';
  if (figure === 'tableBytes')
    return cell.tableBytes < 1_024 ? String(cell.tableBytes) : `${Math.round(cell.tableBytes / 102.4) / 10}k`;
  if (cell.exact) return '=';
  const value = cell[figure];
  return value === null ? '–' : String(Math.round(value)).replace('-', '−');
}
