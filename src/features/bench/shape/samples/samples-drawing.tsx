import { useMemo } from 'react';
import type { SamplesSource } from '../../../../../shared/contract/index.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { curveOf } from '../curve-of.ts';

const [width, height] = [360, 110];
const curvePlaces = 720;
/** More dots than these run into each other. */
const mostDots = 120;

/** The samples as they were recorded, and the curve that resampling makes of them. */
export function SamplesDrawing({ source, isSound }: { source: SamplesSource; isSound: boolean }) {
  const drawn = useMemo(() => (isSound ? draw(source) : null), [source, isSound]);
  const { values } = source;
  let lowest = Infinity;
  let highest = -Infinity;
  for (const value of values) {
    lowest = Math.min(lowest, value);
    highest = Math.max(highest, value);
  }
  const number = (value: number) => formatQuantity(value, '', { significant: 4 });
  return (
    <figure className="samples-figure">
      <svg
        viewBox={`0 0 ${width} ${height}`}
        role="img"
        aria-label={`${values.length} samples from ${number(lowest)} to ${number(highest)}, and the curve through them.`}
      >
        {drawn !== null && (
          <>
            <path d={drawn.curve} className="samples-curve" />
            {drawn.dots.map(([x, y]) => (
              <circle key={x} cx={x} cy={y} r="2" className="samples-dot" />
            ))}
          </>
        )}
      </svg>
      <figcaption>
        {values.length.toLocaleString('en')} samples from {number(lowest)} to {number(highest)}
        {drawn !== null && drawn.dots.length === 0 && ', too close to be told apart here'}.
      </figcaption>
    </figure>
  );
}

function draw(source: SamplesSource): { curve: string; dots: [number, number][] } | null {
  const { values } = source;
  const curve = curveOf(source, curvePlaces);
  if (curve === null) return null;
  let lowest = Infinity;
  let highest = -Infinity;
  for (const list of [values, curve]) {
    for (const value of list) {
      lowest = Math.min(lowest, value);
      highest = Math.max(highest, value);
    }
  }
  const span = highest - lowest || 1;
  const y = (value: number) => Number((height - 6 - ((value - lowest) / span) * (height - 12)).toFixed(2));
  const places = Array.from(curve, (value, k) => `${(k / curvePlaces) * width} ${y(value)}`);
  const dots =
    values.length > mostDots
      ? []
      : values.map((value, k): [number, number] => [(k / values.length) * width, y(value)]);
  return { curve: `M${places.join('L')}`, dots };
}
