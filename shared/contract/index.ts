export * from './definition.ts';
export { findJsonFault, type JsonFault } from './json-fault.ts';
export { limits } from './limits.ts';
export { checkDefinition, parseDefinition, problemsIn, problemsOf } from './parse-definition.ts';
export { Refusal, sayProblem, showPath, showValue, type Problem } from './refusal.ts';
export { brokenRules } from './rules.ts';
export {
  reportSchema,
  warningSchema,
  worstToggleSchema,
  type Report,
  type Warning,
  type WorstToggle,
} from './report.ts';
export * from './accounts.ts';
export * from './fields.ts';
export * from './library.ts';
export * from './mailbox.ts';
export * from './originals.ts';
export * from './pulse-pattern.ts';
export * from './teams.ts';
export * from './rendering.ts';
export * from './audit.ts';
export * from './notices.ts';
export * from './reviews.ts';
export * from './vetting-limits.ts';
export * from './board.ts';
export { checkLadder, ladderSchema, parseLadder, type Ladder, type LadderInput } from './ladder.ts';
export { outputLimits } from './output-limits.ts';
export {
  portMapSchema,
  reservedPinsWays,
  restLevels,
  type Port,
  type PortMap,
  type PortMapInput,
} from './port-map.ts';
export {
  distributions,
  parseTrialSettings,
  trialSettingsSchema,
  type Distribution,
  type TrialSettings,
  type TrialSettingsInput,
} from './trials.ts';
export * from './boards.ts';
export {
  parseResistorBag,
  resistorBagSchema,
  type ResistorBag,
  type ResistorBagInput,
} from './resistor-bag.ts';
