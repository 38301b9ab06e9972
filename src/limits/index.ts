export { LimitList } from './limit-list.tsx';
export { limitNames, limitWords, sayAllowed, sayLimit, sayMeasured, sayStanding } from './words.ts';
