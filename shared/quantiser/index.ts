export { ditherOf } from './dither.ts';
export { quantise, roundInto, type QuantisedCycle } from './quantise.ts';
export { levelsOf, lsbOf, valuesInto } from './scaling.ts';
export { storedWords, tableBytesOf } from './stored-words.ts';
export { valuesOf } from './values.ts';
