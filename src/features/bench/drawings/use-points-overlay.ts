import { useMemo, useState } from 'react';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { pointsOverlay, type PointsOverlay } from '../shape/index.ts';
import { changeDefinition, useBench, useDefinition } from '../state/use-bench.ts';
import { heightScaleOf } from './height-scale.ts';

/**
 * Handles on the cycle for the points of the draft. While one is dragged the scale of heights stands still, though
 * normalising moves the curve: otherwise the handle would run away from the pointer.
 */
export function usePointsOverlay(table: TableAnswer | null): PointsOverlay {
  const source = useDefinition((definition) => definition.source);
  const isHeld = useBench((state) => state.isHeld);
  const newest = useMemo(() => (table === null ? undefined : heightScaleOf(table)), [table]);
  const [scale, setScale] = useState(() => newest);
  if (scale !== newest && !isHeld) setScale(newest);
  return useMemo(
    () =>
      pointsOverlay(
        source,
        (next, how) => changeDefinition((definition) => ({ ...definition, source: next }), how?.coalesce),
        scale,
      ),
    [source, scale],
  );
}
