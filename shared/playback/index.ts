export { accumulatorProblems, outputHz, resolutionHz, type Accumulator } from './accumulator.ts';
export { analyseAccumulator, type AccumulatorFigures } from './analyse-accumulator.ts';
export { strongestByColumn, strongestLines, type AccumulatorLines } from './strongest-lines.ts';
export {
  planStepWord,
  stepWordFor,
  stepWordRule,
  type StepWordPlan,
  type StepWordRule,
  type StepWordSettings,
} from './step-word.ts';
export { centsBetween, nearestPitch, pitchAt, pitchHz, standardA4Hz, type NearestPitch } from './pitch.ts';
export { planRates, type RatePlan, type Timer, type WantedTone } from './plan-rates.ts';
export {
  planTwoTones,
  twoToneSource,
  type TwoToneChoice,
  type TwoTonePlan,
  type TwoTones,
} from './two-tones.ts';
export { sumHeadroom, sumOfVoices, type SumHeadroom, type Voice } from './sum-headroom.ts';
