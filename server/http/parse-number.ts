import { Problem } from './problem.ts';

/** A row's number out of a path; whatever is none cannot be found (404). */
export function parseNumber(text: string): number {
  if (!/^[1-9]\d{0,14}$/.test(text)) throw new Problem('not-found');
  return Number(text);
}
