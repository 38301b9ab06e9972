export { checkLimits, limitSetsFor } from './check-limits.ts';
