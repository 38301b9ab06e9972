export { linesOf, lowLinesOf, phasesDegOf, type Lines } from './lines.ts';
export { transformOf, type Transform } from './transform.ts';
