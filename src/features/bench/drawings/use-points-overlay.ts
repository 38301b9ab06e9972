import { useMemo, useState } from 'react';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { pointsOverlay, type HeightScale, type PointsOverlay } from '../shape/index.ts';
import { changeDefinition, useBench, useDefinition } from '../state/use-bench.ts';
import { heightScaleOf } from './height-scale.ts';

/**
 * Handles on the cycle for the points of the draft. While one is dragged the scale of heights stands still, though
 * normalising moves the curve: otherwise the handle would run away from the pointer.
 */
export function usePointsOverlay(): PointsOverlay {
  const source = useDefinition((definition) => definition.source);
  const atRest = useBench(({ isHeld, table }) => (isHeld ? null : table));
  const [known, setKnown] = useState<{ of: TableAnswer | null; scale: HeightScale | undefined }>({
    of: null,
    scale: undefined,
  });
  if (atRest !== null && atRest !== known.of) setKnown({ of: atRest, scale: heightScaleOf(atRest) });
  const { scale } = known;
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
