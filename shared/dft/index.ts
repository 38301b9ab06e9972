export { linesOf, lowLinesOf, phasesDegOf, type Lines } from './lines.ts';
export { realTransformOf, type RealTransform } from './real-transform.ts';
export { transformOf, type Transform } from './transform.ts';
