export { analyseTable, type TableAnalysis } from './analyse-table.ts';
export { dbfsOf, floorDbfs, spectrumOf, type Spectrum } from './spectrum.ts';
