export * from './definition.ts';
export { limits } from './limits.ts';
export { checkDefinition, parseDefinition, problemsOf } from './parse-definition.ts';
export { Refusal, sayProblem, showPath, showValue, type Problem } from './refusal.ts';
export { reportSchema, warningSchema, worstToggleSchema, type Report, type Warning, type WorstToggle } from './report.ts';
