export { ditherOf } from './dither.ts';
export { errorInto, quantise, type QuantisedCycle } from './quantise.ts';
export { levelsOf, lsbOf } from './scaling.ts';
export { storedWords, tableBytesOf } from './stored-words.ts';
export { valuesOf } from './values.ts';
