import { useMemo } from 'react';

interface SketchProps {
  values: ArrayLike<number>;
  /** What it shows, for who cannot see it. */
  label: string;
}

const width = 600;
const height = 120;

/** A small drawing of values, one after the other, from their lowest to their highest. */
export function Sketch({ values, label }: SketchProps) {
  const path = useMemo(() => curvePath(values, { width, height }), [values]);
  return (
    <svg
      className="import-sketch"
      viewBox={`0 0 ${width} ${height}`}
      preserveAspectRatio="none"
      role="img"
      aria-label={label}
    >
      <path d={path} vectorEffect="non-scaling-stroke" />
    </svg>
  );
}

export interface Box {
  readonly width: number;
  readonly height: number;
}

/** Lowest and highest of each column of pixels, so that no peak is lost; `from` and `to` in values. */
export function curvePath(
  values: ArrayLike<number>,
  box: Box,
  { from, to } = { from: 0, to: Math.max(1, values.length - 1) },
): string {
  const { lowest, highest } = rangeOf(values, from, to);
  const span = highest > lowest ? highest - lowest : 1;
  const y = (value: number) => (2 + (box.height - 4) * (1 - (value - lowest) / span)).toFixed(1);
  const perPixel = (to - from) / box.width;
  const pieces: string[] = [];
  if (perPixel <= 2) {
    for (let i = Math.max(0, Math.ceil(from)); i <= Math.min(values.length - 1, to); i += 1) {
      pieces.push(`${(((i - from) / (to - from)) * box.width).toFixed(1)} ${y(values[i])}`);
    }
  } else {
    for (let x = 0; x < box.width; x += 1) {
      const column = rangeOf(values, from + x * perPixel, from + (x + 1) * perPixel);
      if (column.lowest <= column.highest)
        pieces.push(`${x} ${y(column.lowest)}`, `${x} ${y(column.highest)}`);
    }
  }
  return pieces.length === 0 ? '' : `M${pieces.join('L')}`;
}

function rangeOf(values: ArrayLike<number>, from: number, to: number) {
  let lowest = Infinity;
  let highest = -Infinity;
  for (let i = Math.max(0, Math.ceil(from)); i <= Math.min(values.length - 1, to); i += 1) {
    lowest = Math.min(lowest, values[i]);
    highest = Math.max(highest, values[i]);
  }
  return { lowest, highest };
}
