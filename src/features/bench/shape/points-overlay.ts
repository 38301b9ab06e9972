import { limits, type Source } from '../../../../shared/contract/index.ts';
import type { OnChange } from './change.ts';
import { addPoint, movePoint, removePoint } from './points.ts';

/** The part of the cycle plot's props that lets points be worked on in the drawing. */
export interface PointsOverlay {
  points?: readonly { x: number; y: number }[];
  onPointMove?: (index: number, x: number, y: number) => void;
  onPointAdd?: (x: number, y: number) => void;
  onPointRemove?: (index: number) => void;
}

/** Heights in the drawing and in the source, where levelling lies between the two. */
export interface HeightScale {
  readonly toPlot: (y: number) => number;
  readonly fromPlot: (y: number) => number;
}

const asItIs: HeightScale = { toPlot: (y) => y, fromPlot: (y) => y };
const noPoints: PointsOverlay = {};

/** Props for the cycle plot where the wave is made of points; none where it is made otherwise. */
export function pointsOverlay(
  source: Source,
  onChange: OnChange,
  scale: HeightScale = asItIs,
): PointsOverlay {
  if (source.kind !== 'points') return noPoints;
  const { points } = source;
  const fewest = source.interpolation === 'spline' ? limits.splinePoints.min : limits.points.min;
  return {
    points: scale === asItIs ? points : points.map(({ x, y }) => ({ x, y: scale.toPlot(y) })),
    onPointMove: (index, x, y) =>
      onChange(movePoint(source, index, x, scale.fromPlot(y)), { coalesce: `drag:point:${index}` }),
    onPointAdd(x, y) {
      if (points.length < limits.points.max) onChange(addPoint(source, x, scale.fromPlot(y)));
    },
    onPointRemove(index) {
      if (points.length > fewest) onChange(removePoint(source, index));
    },
  };
}
