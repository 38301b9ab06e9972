import type { TableSettings } from '../contract/index.ts';

export interface WordType {
  /** Type of `<stdint.h>`. */
  readonly name: string;
  readonly bytes: 1 | 2;
  readonly signed: boolean;
}

/** The smallest `<stdint.h>` type that holds every word of a coding: signed for two's complement. */
export function wordTypeOf({ bits, coding }: Pick<TableSettings, 'bits' | 'coding'>): WordType {
  const bytes = bits <= 8 ? 1 : 2;
  const signed = coding === 'twos-complement';
  return { name: `${signed ? '' : 'u'}int${8 * bytes}_t`, bytes, signed };
}
