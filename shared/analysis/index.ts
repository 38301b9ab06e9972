export { analyseTable, type TableAnalysis } from './analyse-table.ts';
export { carrierFigures, type CarrierFigures } from './carrier-figures.ts';
export { dbfsOf, floorDbfs, spectrumOf, type Spectrum } from './spectrum.ts';
