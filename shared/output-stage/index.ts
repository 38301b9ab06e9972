export {
  currentsOf,
  meanSupplyAmps,
  pinAmpsOf,
  supplyAmpsOf,
  type CurrentOptions,
  type LadderCurrents,
} from './currents.ts';
export { ladderReport, type LadderReport } from './ladder-report.ts';
export { outputOhmsOf, voltsOf } from './ladder-volts.ts';
export { linearityOf, type Linearity } from './linearity.ts';
export { resistorsOf, scaledLadder, type Resistors } from './resistors.ts';
export { smallestR, type RLimits, type SmallestR } from './smallest-r.ts';
export { drawsOf, type Draws } from './draws.ts';
export { histogramOf, nearestRank, type Histogram } from './percentiles.ts';
export { type PlayedTable } from './table-through.ts';
export { Trials, type Percentiles, type TrialFigures, type TrialSummary } from './trials.ts';
