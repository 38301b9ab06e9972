import type { VettingLimit, VettingLimits } from '../../../shared/contract/index.ts';
import { parseQuantity } from '../../../shared/quantities/index.ts';
import { limitNames, limitWords } from '../../limits/index.ts';

/** Limits as they are typed; an empty text asks for nothing. */
export type TypedLimits = Readonly<Record<VettingLimit, string>>;

export const noLimits = Object.fromEntries(limitNames.map((name) => [name, ''])) as TypedLimits;

/** The texts that limits would have been typed as. */
export function typeLimits(limits: VettingLimits): TypedLimits {
  const typed: Record<string, string> = { ...noLimits };
  for (const name of limitNames) {
    const limit = limits[name];
    if (limit !== undefined) typed[name] = typeof limit === 'number' ? String(limit) : limit.join(', ');
  }
  return typed as TypedLimits;
}

/**
 * Reads what was typed: a number with or without its unit, or a list of numbers. What is neither stays text, so that
 * the schema says what is allowed there.
 */
export function readLimits(typed: TypedLimits): Record<string, unknown> {
  const read: Record<string, unknown> = {};
  for (const name of limitNames) {
    const text = typed[name].trim();
    if (text === '') continue;
    read[name] =
      limitWords[name].bound === 'one of' ? readList(text) : readNumber(text, limitWords[name].unit);
  }
  return read;
}

function readNumber(text: string, unit: string): unknown {
  // A share is a number without unit: "2 %" is 0.02.
  const reading = parseQuantity(text, unit === 'of full scale' ? '' : unit);
  return reading.kind === 'number' ? reading.value : text;
}

function readList(text: string): unknown {
  const numbers = text.split(/[\s,;]+/).filter((part) => part !== '');
  const read = numbers.map(Number);
  return read.every((number) => Number.isFinite(number)) ? read : text;
}
