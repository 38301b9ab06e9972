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
export { boardOhms, boardVolts, ladderOf, stagePartsOf } from './board-levels.ts';
export { filterGain, holdGain, rcCutoffHz, stageGain, type StageParts } from './filter.ts';
export { glitchesOf, type Glitch, type Glitches } from './glitches.ts';
export { firstImageOf, outputLines, type FirstImage, type OutputLine } from './images.ts';
export {
  portWordsOf,
  registerWordsOf,
  serialBytesOf,
  serialWordsOf,
  type MappedWords,
  type PortWords,
} from './port-words.ts';
export { pwmCarrierHz, pwmDuty, pwmHarmonicVolts, pwmRippleVolts, pwmVolts } from './pwm.ts';
export {
  fullPowerBandwidthHz,
  largestStepOf,
  settlingOf,
  slewTimeS,
  type Settling,
  type TableStep,
} from './settling.ts';
export { stageWaveform, type StageInput, type StageWaveform } from './stage-waveform.ts';
export { assignResistors, type Assignment } from './assign-resistors.ts';
export { sinadAgainstBits, type BitsThatMatter, type SinadOfBits } from './bits-that-matter.ts';
export { fitLevels, levelsFromWeights, type ChangedField, type FittedTable } from './fit-levels.ts';
export { opAmpFollows, type OpAmpAnswer } from './op-amp-follows.ts';
export {
  decadeOf,
  ladderValues,
  partsOf,
  resistorSeries,
  standardValues,
  type LadderValues,
  type ResistorSeries,
} from './standard-values.ts';
export { markedTolerances, toleranceForYield, type ToleranceForYield } from './tolerance-for-yield.ts';
export { boardDigestOf } from './board-digest.ts';
