export { analyseTable, type TableAnalysis } from './analyse-table.ts';
export { linesOf, lowLinesOf, phasesDegOf, type Lines } from './lines.ts';
export { dbfsOf, floorDbfs, spectrumOf, type Spectrum } from './spectrum.ts';
export { transformOf, type Transform } from './transform.ts';
