import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { lookAtLevels } from './linearity-of.ts';

const [width, height, foot] = [360, 96, 72];

/** Measured levels by code over the even ones, and below how far each lies off, in LSB of the mean step. */
export function LevelsDrawing({ volts }: { volts: readonly number[] }) {
  const look = lookAtLevels(volts);
  const { lowest, highest, offLsb, worstCode, isMonotonic, stepVolts } = look;
  const v = (value: number) => formatQuantity(value, 'V', { significant: 4 });
  const worst = offLsb === null ? null : formatQuantity(offLsb[worstCode], 'LSB', { significant: 3 });
  const said =
    worst === null
      ? 'The first and the last level are equal, so there is no even step to compare with.'
      : `The largest deviation from even steps of ${v(stepVolts)} is ${worst}, at code ${worstCode}.`;
  const reach = offLsb === null ? 1 : Math.max(0.5, Math.abs(offLsb[worstCode]) * 1.1);
  const span = highest - lowest || 1;
  return (
    <figure className="levels-figure">
      <svg
        viewBox={`0 0 ${width} ${height + foot}`}
        role="img"
        aria-label={`${volts.length} levels from ${v(lowest)} to ${v(highest)}. ${said} ${
          isMonotonic ? 'Every step goes up.' : 'Not every step goes up.'
        }`}
      >
        <path
          d={`M0 ${y(volts[0], lowest, span)}L${width} ${y(volts[volts.length - 1], lowest, span)}`}
          className="levels-even"
        />
        <path
          d={pathOf(
            volts.length,
            (code) => volts[code],
            (volt) => y(volt, lowest, span),
          )}
          className="levels-measured"
        />
        <text x="4" y="12">
          {v(highest)}
        </text>
        <text x={width - 4} y={height - 4} textAnchor="end">
          {v(lowest)}
        </text>
        <path d={`M0 ${height + foot / 2}H${width}`} className="levels-even" />
        {offLsb !== null && (
          <path
            d={pathOf(
              offLsb.length,
              (code) => offLsb[code],
              (off) => height + foot / 2 - (off / reach) * (foot / 2 - 4),
            )}
            className="levels-measured"
          />
        )}
        <text x="4" y={height + 14}>
          {`+${formatQuantity(reach, 'LSB', { significant: 2 })} off`}
        </text>
      </svg>
      <figcaption>
        {said}{' '}
        {isMonotonic
          ? 'Every step goes up.'
          : 'Not every step goes up: the nearest level is taken all the same.'}
      </figcaption>
    </figure>
  );
}

function y(volt: number, lowest: number, span: number): number {
  return height - 4 - ((volt - lowest) / span) * (height - 8);
}

/** A line over all codes; of more than a column holds, the lowest and the highest. */
function pathOf(count: number, valueAt: (code: number) => number, yOf: (value: number) => number): string {
  const columns = Math.min(count, width);
  const places: string[] = [];
  for (let column = 0; column < columns; column += 1) {
    const first = Math.floor((column * count) / columns);
    const end = Math.floor(((column + 1) * count) / columns);
    let lowest = Infinity;
    let highest = -Infinity;
    for (let code = first; code < end; code += 1) {
      lowest = Math.min(lowest, valueAt(code));
      highest = Math.max(highest, valueAt(code));
    }
    const x = count === 1 ? 0 : (first / (count - 1)) * width;
    places.push(`${x.toFixed(2)} ${yOf(highest).toFixed(2)}`);
    if (lowest !== highest) places.push(`${x.toFixed(2)} ${yOf(lowest).toFixed(2)}`);
  }
  return `M${places.join('L')}`;
}
