export { againstSignal, exactPower, isConstant, type SignalFacts } from './against-signal.ts';
export { analyseTable, type TableAnalysis } from './analyse-table.ts';
export { carrierFigures, type CarrierFigures } from './carrier-figures.ts';
export { spreadOf, type Spread } from './moments.ts';
export { dbfsOf, floorDbfs, spectrumOf, strongestLineOf, type Spectrum } from './spectrum.ts';
