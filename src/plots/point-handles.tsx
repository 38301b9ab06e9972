import { useLayoutEffect, useRef, type KeyboardEvent, type PointerEvent, type RefObject } from 'react';
import { onEarlyMoves } from '../components/index.ts';
import type { PlotArea } from './plot-area.ts';

/** A point of the shape as it stands on the drawing. */
export interface PlotPoint {
  /** Place in the cycle, 0 ≤ x < 1. */
  x: number;
  /** Signal at that place, in the units of `cycle`. */
  y: number;
}

export interface PointHandlesProps {
  points: readonly PlotPoint[];
  places: {
    /** First place on the plot's x of a place in the cycle, and back. */
    toEntry: (x: number) => number;
    toCycle: (entry: number) => number;
    /** What one arrow key moves a point by. */
    step: () => { x: number; y: number };
  };
  /** The plot's area, once it has been drawn. */
  area: RefObject<PlotArea | null>;
  onMove?: ((index: number, x: number, y: number) => void) | undefined;
  onRemove?: ((index: number) => void) | undefined;
  /** Called with what sets the handles where they belong, for use after each drawing. */
  onPlacer: (place: ((area: PlotArea) => void) | null) => void;
}

/** Handles beyond this many would lie on one another; the table beside the drawing takes them all. */
const mostHandles = 256;
/** Points keep their order: this far from a neighbour at least, in cycles. */
const apart = 1e-4;

/** Stones to drag on the cycle. Each is a button: arrows move it, Shift ten steps at a time, Delete takes it away. */
export function PointHandles({ points, places, area, onPlacer, ...props }: PointHandlesProps) {
  const group = useRef<HTMLDivElement>(null);

  useLayoutEffect(() => {
    const place = (drawn: PlotArea) => {
      const handles = group.current?.children ?? [];
      for (let index = 0; index < handles.length; index += 1) {
        const handle = handles[index] as HTMLElement;
        const point = points[index];
        const left = drawn.x(places.toEntry(point.x)) - drawn.left;
        handle.style.transform = `translate(${left}px, ${drawn.y(point.y) - drawn.top}px)`;
        handle.hidden = left < -1 || left > drawn.width + 1;
      }
    };
    onPlacer(place);
    if (area.current) place(area.current);
    return () => {
      onPlacer(null);
    };
  }, [points, places, area, onPlacer]);

  /** Hands on a new place, kept between the neighbours and inside the cycle. */
  const move = (index: number, x: number, y: number) => {
    const least = index === 0 ? 0 : points[index - 1].x + apart;
    const most = (index === points.length - 1 ? 1 : points[index + 1].x) - apart;
    props.onMove?.(index, Math.min(most, Math.max(least, x)), y);
  };

  const dragTo = (index: number, { clientX, clientY }: { clientX: number; clientY: number }) => {
    if (!area.current || !group.current) return;
    const { left, top } = group.current.getBoundingClientRect();
    const drawn = area.current;
    const px = drawn.left + Math.min(drawn.width, Math.max(0, clientX - left));
    const py = drawn.top + Math.min(drawn.height, Math.max(0, clientY - top));
    move(index, places.toCycle(drawn.valueAtX(px)), drawn.valueAtY(py));
  };
  const latestDrag = useRef(dragTo);
  useLayoutEffect(() => {
    latestDrag.current = dragTo;
  });

  const onPointerDown = (index: number) => (event: PointerEvent<HTMLButtonElement>) => {
    event.currentTarget.setPointerCapture(event.pointerId);
    event.stopPropagation();
    onEarlyMoves(event.currentTarget, event.pointerId, (early) => latestDrag.current(index, early));
  };

  const onPointerMove = (index: number) => (event: PointerEvent<HTMLButtonElement>) => {
    if (event.currentTarget.hasPointerCapture(event.pointerId)) dragTo(index, event);
  };

  const onKeyDown = (index: number) => (event: KeyboardEvent<HTMLButtonElement>) => {
    const size = event.shiftKey ? 10 : 1;
    const { x, y } = points[index];
    const step = places.step();
    const [stepX, stepY] = [size * step.x, size * step.y];
    if (event.key === 'ArrowLeft') move(index, x - stepX, y);
    else if (event.key === 'ArrowRight') move(index, x + stepX, y);
    else if (event.key === 'ArrowUp') move(index, x, y + stepY);
    else if (event.key === 'ArrowDown') move(index, x, y - stepY);
    else if (event.key === 'Delete' || event.key === 'Backspace') {
      // The focus stays where it is, on what is now the next point; from the last one it steps back.
      const before = event.currentTarget.previousElementSibling;
      if (index === points.length - 1 && before instanceof HTMLElement) before.focus();
      props.onRemove?.(index);
    } else return;
    event.preventDefault();
    event.stopPropagation();
  };

  if (points.length > mostHandles) return null;
  return (
    <div ref={group} className="plot-handles" role="group" aria-label="Points of the shape">
      {points.map((point, index) => (
        <button
          // Points are told apart by their order alone.
          key={index}
          type="button"
          className="plot-handle"
          aria-label={`Point ${index + 1} of ${points.length}: x ${short(point.x)}, y ${short(point.y)}`}
          aria-description="Arrow keys move it, Shift ten steps, Delete takes it away"
          onPointerDown={onPointerDown(index)}
          onPointerMove={onPointerMove(index)}
          onKeyDown={onKeyDown(index)}
          onDoubleClick={(event) => {
            event.stopPropagation();
          }}
        />
      ))}
    </div>
  );
}

function short(value: number): string {
  return String(Number(value.toPrecision(4)));
}
