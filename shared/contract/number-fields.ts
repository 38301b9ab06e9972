import { z } from 'zod';

// Fields of numbers; each error text says what is allowed.

export interface Bounds {
  readonly min: number;
  readonly max: number;
}

export const wholeNumberIn = ({ min, max }: Bounds) => {
  const error = `a whole number from ${min} to ${max}`;
  return z.int({ error }).min(min, { error }).max(max, { error });
};

/** @param unit written behind the bounds: `a number from 0 to 1 V` */
export const numberIn = ({ min, max }: Bounds, unit = '') => {
  const error = `a number from ${shown(min)} to ${shown(max)}${unit === '' ? '' : ` ${unit}`}`;
  return z.number({ error }).min(min, { error }).max(max, { error });
};

/** Long rows of noughts are hard to count: `1e12`. */
const shown = (bound: number) =>
  Math.abs(bound) < 1e6 ? String(bound) : bound.toExponential().replace('+', '');

/** A list whose length is looked at before its items are: input made to do harm can hold millions. */
export const shortListOf = <Item extends z.ZodType>(item: Item, { min, max }: Bounds, what: string) => {
  const error = min === max ? `a list of ${max} ${what}` : `a list of ${min} to ${max} ${what}`;
  return z.array(z.unknown(), { error }).min(min, { error }).max(max, { error }).pipe(z.array(item));
};

export const oneWordOf = <const Values extends readonly [string, ...string[]]>(values: Values) =>
  z.enum(values, { error: `one of ${values.map((value) => `"${value}"`).join(', ')}` });
