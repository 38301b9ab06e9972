import { useMemo } from 'react';
import type { Source } from '../../../../shared/contract/index.ts';
import { curveOf } from './curve-of.ts';

const [width, height] = [96, 32];

/** One cycle of a source, as high as it swings; the words beside it say what it is. */
export function CycleSketch({ source, isSound }: { source: Source; isSound: boolean }) {
  const path = useMemo(() => (isSound ? pathOf(source) : null), [source, isSound]);
  return (
    <svg className="cycle-sketch" viewBox={`0 0 ${width} ${height}`} aria-hidden="true" focusable="false">
      <path d={`M0 ${height / 2}H${width}`} stroke="var(--edge)" />
      {path !== null && <path d={path} fill="none" stroke="var(--water)" strokeWidth="1.5" />}
    </svg>
  );
}

function pathOf(source: Source): string | null {
  const curve = curveOf(source, 2 * width);
  if (curve === null) return null;
  const peak = curve.reduce((most, value) => Math.max(most, Math.abs(value)), 0) || 1;
  const places = Array.from(
    curve,
    (value, k) => `${k / 2} ${(height / 2 - (value / peak) * (height / 2 - 2)).toFixed(2)}`,
  );
  return `M${places.join('L')}`;
}
