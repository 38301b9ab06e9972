import type { PlotView } from './plot-link.ts';

/** What gestures ask of a plot. Places are CSS pixels from the left edge of the surface. */
export interface GestureTarget {
  isZoomed(): boolean;
  view(): PlotView;
  setView(view: PlotView): void;
  valueAt(px: number): number;
  zoomAbout(px: number, factor: number): void;
  panBy(px: number): void;
  pointAt(px: number): void;
  leave(): void;
}

const wheelRate = 0.0016;

/**
 * Pointer, wheel and pinch on a surface. A plain wheel zooms only while the plot has the focus, so that the page still
 * scrolls under a passing pointer; with Ctrl (a pinch on a touch pad) it always does.
 */
export function attachGestures(surface: HTMLElement, target: GestureTarget): () => void {
  const ending = new AbortController();
  const { signal } = ending;
  const pointers = new Map<number, number>();
  const placeOf = (event: MouseEvent) => event.clientX - surface.getBoundingClientRect().left;
  let pinchSpan = 0;

  const onWheel = (event: WheelEvent) => {
    const sideways = event.shiftKey ? event.deltaY || event.deltaX : event.deltaX;
    const isZoom = event.ctrlKey || event.metaKey || document.activeElement === surface;
    if (!event.ctrlKey && Math.abs(sideways) > Math.abs(event.shiftKey ? 0 : event.deltaY)) {
      if (!target.isZoomed()) return;
      event.preventDefault();
      target.panBy(sideways);
    } else if (isZoom) {
      event.preventDefault();
      target.zoomAbout(placeOf(event), Math.exp(event.deltaY * wheelRate * (event.ctrlKey ? 4 : 1)));
    }
  };

  const onPointerDown = (event: PointerEvent) => {
    if (event.button !== 0) return;
    pointers.set(event.pointerId, placeOf(event));
    surface.setPointerCapture(event.pointerId);
    if (pointers.size === 2) pinchSpan = spanOf(pointers);
    target.pointAt(placeOf(event));
  };

  const onPointerMove = (event: PointerEvent) => {
    const place = placeOf(event);
    const before = pointers.get(event.pointerId);
    if (before === undefined) {
      if (event.pointerType !== 'touch') target.pointAt(place);
      return;
    }
    pointers.set(event.pointerId, place);
    if (pointers.size === 2) {
      const span = spanOf(pointers);
      if (pinchSpan > 0 && span > 0) target.zoomAbout(middleOf(pointers), pinchSpan / span);
      pinchSpan = span;
    } else if (target.isZoomed()) {
      target.panBy(before - place);
    } else {
      target.pointAt(place);
    }
  };

  const onPointerEnd = (event: PointerEvent) => {
    pointers.delete(event.pointerId);
  };

  surface.addEventListener('wheel', onWheel, { passive: false, signal });
  surface.addEventListener('pointerdown', onPointerDown, { signal });
  surface.addEventListener('pointermove', onPointerMove, { signal });
  surface.addEventListener('pointerup', onPointerEnd, { signal });
  surface.addEventListener('pointercancel', onPointerEnd, { signal });
  surface.addEventListener(
    'pointerleave',
    (event) => {
      if (event.pointerType !== 'touch' && document.activeElement !== surface) target.leave();
    },
    { signal },
  );
  return () => {
    ending.abort();
  };
}

function spanOf(pointers: Map<number, number>): number {
  const [first, second] = pointers.values();
  return Math.abs(first - second);
}

function middleOf(pointers: Map<number, number>): number {
  const [first, second] = pointers.values();
  return (first + second) / 2;
}
