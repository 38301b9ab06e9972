import { useCallback, useMemo, useRef, useState } from 'react';
import { useKeyGroup, type KeyGroup } from '../components/index.ts';
import type { Live } from '../live/index.ts';
import { CycleScene, type CycleData } from './cycle-scene.ts';
import type { PlotArea } from './plot-area.ts';
import { usePlotLink } from './plot-link.ts';
import { Plot } from './plot.tsx';
import { PointHandles, type PlotPoint } from './point-handles.tsx';

export type { PlotPoint } from './point-handles.tsx';

export interface CyclePlotProps {
  data: Live<CycleData>;
  points?: readonly PlotPoint[] | undefined;
  onPointMove?: ((index: number, x: number, y: number) => void) | undefined;
  onPointAdd?: ((x: number, y: number) => void) | undefined;
  onPointRemove?: ((index: number) => void) | undefined;
}

const drawingKeys: KeyGroup = {
  title: 'Drawings',
  keys: [
    { caps: ['←', '→'], does: 'Read the entry before or after' },
    { caps: ['Home', 'End'], does: 'Read the first or last entry' },
    { caps: ['+', '−'], does: 'Zoom in or out' },
    { caps: ['0'], does: 'Show all' },
    { caps: ['Shift', '→'], does: 'Pan, while zoomed in' },
    { caps: ['Enter'], does: 'Add a point at the entry that is read' },
    { caps: ['Delete'], does: 'Take the point with the focus away' },
  ],
};

/** The ideal cycle under the staircase of its codes, and the points of its shape where it has any. */
export function CyclePlot({ data, points, onPointMove, onPointAdd, onPointRemove }: CyclePlotProps) {
  const [scene] = useState(() => new CycleScene(data.now()));
  const link = usePlotLink();
  useKeyGroup(drawingKeys);

  // t = (k·K/N + φ/360) mod 1, without δ: a point stands on the curve, which is drawn at k + δ.
  const places = useMemo(
    () => ({
      toEntry(x: number) {
        const { codes, cycles, startPhaseDeg } = data.now();
        return (modulo1(x - startPhaseDeg / 360) * codes.length) / cycles;
      },
      toCycle(entry: number) {
        const { codes, cycles, startPhaseDeg } = data.now();
        return modulo1((entry * cycles) / codes.length + startPhaseDeg / 360);
      },
      /** What one arrow key moves a point by: an entry, and an LSB or a hundredth where that is more. */
      step() {
        const { codes, lsb } = data.now();
        return { x: 1 / codes.length, y: Math.max(lsb, 0.01) };
      },
    }),
    [data],
  );

  const area = useRef<PlotArea | null>(null);
  const placer = useRef<((drawn: PlotArea) => void) | null>(null);
  const onPlacer = useCallback((place: typeof placer.current) => {
    placer.current = place;
  }, []);
  const onDrawn = useCallback((drawn: PlotArea) => {
    area.current = drawn;
    placer.current?.(drawn);
  }, []);

  return (
    <Plot
      title="Cycle"
      kind="cycle"
      scene={scene}
      data={data}
      link={link}
      hasZoom
      onDrawn={onDrawn}
      onDoublePress={(entry, y) => onPointAdd?.(places.toCycle(entry), y)}
      onEnter={(item) => onPointAdd?.(places.toCycle(item + 0.5), data.now().cycle[item])}
    >
      {points && (
        <PointHandles
          points={points}
          places={places}
          area={area}
          onMove={onPointMove}
          onRemove={onPointRemove}
          onPlacer={onPlacer}
        />
      )}
    </Plot>
  );
}

function modulo1(x: number): number {
  return x - Math.floor(x);
}
