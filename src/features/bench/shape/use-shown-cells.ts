import { useCallback, useLayoutEffect, useRef, useState, type RefObject } from 'react';

/** Narrowest cell of a bar, in CSS pixels; where more bars are shown than fit the field scrolls. */
const leastPitch = 5;
/** Cells kept ready beyond both edges. */
const spare = 12;
/** Width until the field has been measured. */
const usualWidth = 320;

export interface ShownCells {
  /** The scrolling box. */
  frame: RefObject<HTMLDivElement | null>;
  onScroll: () => void;
  /** Width of a bar's cell in CSS pixels. */
  pitch: number;
  /** First and last cell in sight, counted from 1. */
  first: number;
  last: number;
  /** Whether there are cells out of sight before and after. */
  hasEarlier: boolean;
  hasLater: boolean;
  /** Scrolls by most of the box's width. */
  turn: (direction: -1 | 1) => void;
  bringIntoSight: (cell: number) => void;
  /** Middle of a cell from the scrolling box's left edge, held inside it. */
  middleInSight: (cell: number) => number;
}

/** Lays `shown` cells over the width of a box, and says which of them are in sight. */
export function useShownCells(shown: number): ShownCells {
  const frame = useRef<HTMLDivElement>(null);
  const [sight, setSight] = useState({ width: usualWidth, scrolled: 0 });

  const look = useCallback(() => {
    const box = frame.current;
    if (box === null) return;
    const next = { width: box.clientWidth || usualWidth, scrolled: box.scrollLeft };
    setSight((now) => (now.width === next.width && now.scrolled === next.scrolled ? now : next));
  }, []);

  useLayoutEffect(() => {
    const box = frame.current;
    if (box === null) return;
    // It calls back at once, and then with every change of the box.
    const observer = new ResizeObserver(look);
    observer.observe(box);
    return () => observer.disconnect();
  }, [look]);

  const pitch = Math.max(leastPitch, sight.width / shown);
  return {
    frame,
    onScroll: look,
    pitch,
    first: Math.max(1, Math.floor(sight.scrolled / pitch) + 1 - spare),
    last: Math.min(shown, Math.ceil((sight.scrolled + sight.width) / pitch) + spare),
    hasEarlier: sight.scrolled > 1,
    hasLater: sight.scrolled + sight.width < shown * pitch - 1,
    turn(direction) {
      frame.current?.scrollBy({ left: direction * sight.width * 0.9, behavior: 'smooth' });
    },
    bringIntoSight(cell) {
      const box = frame.current;
      if (box === null) return;
      const left = (cell - 1) * pitch;
      if (left < box.scrollLeft) box.scrollLeft = Math.max(0, left - pitch);
      else if (left + pitch > box.scrollLeft + box.clientWidth)
        box.scrollLeft = left + 2 * pitch - box.clientWidth;
    },
    middleInSight: (cell) => Math.min(sight.width - 60, Math.max(60, (cell - 0.5) * pitch - sight.scrolled)),
  };
}
