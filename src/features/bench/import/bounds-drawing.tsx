import { useMemo, useRef, useState, type KeyboardEvent, type PointerEvent } from 'react';
import type { CycleBounds } from '../../../../shared/imports/index.ts';
import { Button } from '../../../components/index.ts';
import { joinClasses } from '../../../components/join-classes.ts';
import { curvePath } from './sketch.tsx';

interface BoundsDrawingProps {
  samples: Float64Array;
  bounds: CycleBounds;
  onChange: (bounds: CycleBounds) => void;
}

interface Sight {
  readonly from: number;
  readonly to: number;
}

const box = { width: 800, height: 200 };

/** Two cycles on each side of the one that is cut. */
function sightOf({ startSample, endSample }: CycleBounds, last: number, cycles = 2): Sight {
  const beside = cycles * (endSample - startSample);
  return { from: Math.max(0, startSample - beside), to: Math.min(last, endSample + beside) };
}

/** A stretch of the recording with the two bounds of the cycle on it, to be dragged or moved by keys. */
export function BoundsDrawing({ samples, bounds, onChange }: BoundsDrawingProps) {
  const last = samples.length - 1;
  const [sight, setSight] = useState(() => sightOf(bounds, last));
  const isOutside = bounds.startSample < sight.from || bounds.endSample > sight.to;
  const shown = isOutside ? sightOf(bounds, last) : sight;
  const path = useMemo(() => curvePath(samples, box, shown), [samples, shown.from, shown.to]); // eslint-disable-line react-hooks/exhaustive-deps
  const drawing = useRef<HTMLDivElement>(null);
  const { startSample, endSample } = bounds;
  const share = (at: number) => (at - shown.from) / (shown.to - shown.from);

  const move = (which: 'start' | 'end' | 'both', to: number) => {
    if (which === 'start') onChange({ startSample: Math.max(0, Math.min(to, endSample - 2)), endSample });
    else if (which === 'end')
      onChange({ startSample, endSample: Math.min(last, Math.max(to, startSample + 2)) });
    else {
      const start = Math.max(0, Math.min(to, last - (endSample - startSample)));
      onChange({ startSample: start, endSample: start + (endSample - startSample) });
    }
  };
  const drag = (which: 'start' | 'end') => (event: PointerEvent<HTMLElement>) => {
    const place = drawing.current?.getBoundingClientRect();
    if (!event.currentTarget.hasPointerCapture(event.pointerId) || !place) return;
    move(which, shown.from + ((event.clientX - place.left) / place.width) * (shown.to - shown.from));
  };
  const zoom = (cycles: number) => setSight(sightOf(bounds, last, cycles));

  return (
    <div className="space-y-2">
      <div ref={drawing} className="bounds-drawing">
        <svg
          viewBox={`0 0 ${box.width} ${box.height}`}
          preserveAspectRatio="none"
          aria-hidden="true"
          focusable="false"
        >
          <rect
            x={share(startSample) * box.width}
            width={Math.max(0, share(endSample) - share(startSample)) * box.width}
            height={box.height}
          />
          <path d={path} vectorEffect="non-scaling-stroke" />
        </svg>
        {(['start', 'end'] as const).map((which) => {
          const at = which === 'start' ? startSample : endSample;
          return (
            <div
              key={which}
              role="slider"
              tabIndex={0}
              className={joinClasses('bound', `bound-${which}`)}
              style={{ insetInlineStart: `${100 * share(at)}%` }}
              aria-label={which === 'start' ? 'Start of the cycle' : 'End of the cycle'}
              aria-valuemin={0}
              aria-valuemax={last}
              aria-valuenow={Math.round(at)}
              aria-valuetext={`sample ${at.toFixed(1)}`}
              onPointerDown={(event) => event.currentTarget.setPointerCapture(event.pointerId)}
              onPointerMove={drag(which)}
              onKeyDown={(event: KeyboardEvent) => {
                const step = stepOf(event);
                if (step === undefined) return;
                event.preventDefault();
                move(which, at + step);
              }}
            />
          );
        })}
      </div>
      <p className="field-description">
        Amplitude over time, samples {Math.round(shown.from).toLocaleString('en')} to{' '}
        {Math.round(shown.to).toLocaleString('en')}. Drag the bounds, or move them with the arrow keys; with
        Shift by ten.
      </p>
      <label className="field-description bounds-place">
        Place of the cycle in the recording
        <input
          type="range"
          min={0}
          max={Math.floor(last - (endSample - startSample))}
          step={1}
          value={Math.round(startSample)}
          onChange={({ target }) => move('both', Number(target.value))}
        />
      </label>
      <div className="form-actions">
        <Button size="small" variant="quiet" onPress={() => zoom(0.2)}>
          Closer
        </Button>
        <Button size="small" variant="quiet" onPress={() => zoom(8)}>
          Wider
        </Button>
      </div>
    </div>
  );
}

/** Samples that a key moves a bound by; with Shift ten times as many. */
function stepOf({ key, shiftKey, altKey, ctrlKey, metaKey }: KeyboardEvent): number | undefined {
  if (altKey || ctrlKey || metaKey) return undefined;
  const unit = shiftKey ? 10 : 1;
  const steps: Record<string, number> = {
    ArrowLeft: -unit,
    ArrowDown: -unit,
    ArrowRight: unit,
    ArrowUp: unit,
    PageDown: -100,
    PageUp: 100,
  };
  return steps[key];
}
