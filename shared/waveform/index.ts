import { pulse, sawtooth, sine, square, triangle } from './standard-shapes.ts';

export { closedCurve, type ClosedCurve } from './interpolate.ts';
export { fitsTable } from './harmonics.ts';
export { levelCycle, type LevelledCycle } from './level.ts';
export { phasesOf } from './phases.ts';
export { synthesise, type Synthesis } from './synthesise.ts';

/** The standard shapes, each a `harmonics` source with its Fourier series. */
export const standardShapes = { sine, triangle, sawtooth, square, pulse };
