import { useCallback, useLayoutEffect, useMemo, useRef, useState } from 'react';
import { useKeyGroup, type KeyGroup } from '../components/index.ts';
import { CycleScene, type CycleData } from './cycle-scene.ts';
import type { PlotArea } from './plot-area.ts';
import { usePlotLink } from './plot-link.ts';
import { Plot } from './plot.tsx';
import { PointHandles, type PlotPoint } from './point-handles.tsx';

export type { PlotPoint } from './point-handles.tsx';

export interface CyclePlotProps {
  /** The levelled cycle, one value an entry. */
  cycle: Float64Array;
  /** What the codes stand for, in the units of `cycle`. */
  values: Float64Array;
  /** 0…2^bits − 1. */
  codes: Uint16Array;
  bits: number;
  range: 'bipolar' | 'unipolar';
  /** One LSB in the units of `cycle`. */
  lsb: number;
  errorLsb: Float64Array;
  sampleAt: 'start' | 'centre';
  /** Periods of the wave in the table; 1 unless told. Places points. */
  cycles?: number;
  /** Where the table starts in the cycle, in degrees; 0 unless told. Places points. */
  startPhaseDeg?: number;
  points?: readonly PlotPoint[];
  onPointMove?: (index: number, x: number, y: number) => void;
  onPointAdd?: (x: number, y: number) => void;
  onPointRemove?: (index: number) => void;
  onPointFocus?: (index: number) => void;
  /** Pin voltage of a code, shown in the read-out. */
  voltsOf?: (code: number) => number;
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
export function CyclePlot({
  points,
  onPointMove,
  onPointAdd,
  onPointRemove,
  onPointFocus,
  ...props
}: CyclePlotProps) {
  const {
    cycle,
    values,
    codes,
    bits,
    range,
    lsb,
    errorLsb,
    sampleAt,
    voltsOf,
    cycles = 1,
    startPhaseDeg = 0,
  } = props;
  const data = useMemo<CycleData>(
    () => ({ cycle, values, codes, bits, range, lsb, errorLsb, sampleAt, voltsOf }),
    [cycle, values, codes, bits, range, lsb, errorLsb, sampleAt, voltsOf],
  );
  const [scene] = useState(() => new CycleScene(data));
  const link = usePlotLink();
  useKeyGroup(drawingKeys);

  useLayoutEffect(() => {
    scene.set(data);
  }, [scene, data]);

  const length = codes.length;
  const start = startPhaseDeg / 360;
  // t = (k·K/N + φ/360) mod 1, without δ: a point stands on the curve, which is drawn at k + δ.
  const toEntry = useCallback((x: number) => (modulo1(x - start) * length) / cycles, [start, length, cycles]);
  const toCycle = useCallback(
    (entry: number) => modulo1((entry * cycles) / length + start),
    [start, length, cycles],
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
      link={link}
      version={data}
      hasZoom
      onDrawn={onDrawn}
      onDoublePress={(entry, y) => onPointAdd?.(toCycle(entry), y)}
      onEnter={(item) => onPointAdd?.(toCycle(item + 0.5), cycle[item])}
    >
      {points && (
        <PointHandles
          points={points}
          tableLength={length}
          lsb={lsb}
          toEntry={toEntry}
          toCycle={toCycle}
          area={area}
          onMove={onPointMove}
          onRemove={onPointRemove}
          onFocus={onPointFocus}
          onPlacer={onPlacer}
        />
      )}
    </Plot>
  );
}

function modulo1(x: number): number {
  return x - Math.floor(x);
}
