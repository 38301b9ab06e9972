export { pointsOverlay, type HeightScale, type PointsOverlay } from './points-overlay.ts';
export { ShapeFlight, type ShapeFlightProps } from './shape-flight.tsx';
export { sayInWords } from './source-words.ts';
