import { Refusal, showValue } from '../contract/index.ts';

/** @throws {Refusal} where the value is no finite number above 0. */
export function mustBePositive(path: string, value: number): void {
  if (Number.isFinite(value) && value > 0) return;
  throw new Refusal({ path, value: showValue(value), allowed: 'a number above 0' });
}

/** @throws {Refusal} where the value is no whole number of the range. */
export function mustBeWhole(path: string, value: number, min: number, max: number): void {
  if (Number.isInteger(value) && value >= min && value <= max) return;
  throw new Refusal({ path, value: showValue(value), allowed: `a whole number from ${min} to ${max}` });
}
