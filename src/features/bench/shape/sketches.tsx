import type { PointStart, Shape } from './starts.ts';

/** Two cycles of each shape on a board of 48 × 24, the middle at 12. */
const drawings: Record<Shape | PointStart, string> = {
  sine: 'M2 12C5.5 0 9.5 0 13 12s7.5 12 11 0 7.5-12 11 0 7.5 12 11 0',
  triangle: 'M2 12 7.5 3l11 18 11-18 11 18L46 12',
  sawtooth: 'M2 12 13 3v18l22-18v18l11-9',
  square: 'M2 21V3h11v18h11V3h11v18h11V3',
  pulse: 'M2 21V3h5v18h17V3h5v18h17V3',
  ramp: 'M2 21 24 3v18L46 3v18',
  step: 'M2 21h11V3h11v18h11V3h11',
  trapezoid: 'M2 21 8 3h6l6 18h6l6-18h6l6 18',
  fade: 'M2 21c6 0 5-18 11-18 7 0 5 18 11 18s4-18 11-18c6 0 5 18 11 18',
};

/** A small drawing of a shape; the words beside it name it. */
export function Sketch({ of }: { of: Shape | PointStart }) {
  return (
    <svg className="sketch" viewBox="0 0 48 24" width="48" height="24" aria-hidden="true" focusable="false">
      <path d={drawings[of]} fill="none" stroke="currentColor" strokeWidth="1.75" strokeLinejoin="miter" />
    </svg>
  );
}
