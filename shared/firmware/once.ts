import { Refusal, showValue } from '../contract/index.ts';
import type { ExportableTable } from './exportable-table.ts';

export interface OnceOptions {
  /** Code that the output rests at; the middle one where left out. */
  readonly idleCode?: number;
  /** Words between the idle code and the wave, on either side. */
  readonly rampWords?: number;
}

/**
 * Words of a wave that plays once: from the idle code to the first word in even steps, the wave, back in even steps,
 * and the idle word, at which the output stays. Steps are rounded half up.
 *
 * @throws {Refusal} where the idle code is none of the table's, or the table is folded
 */
export function wordsToPlayOnce(
  { definition: { table }, stored }: ExportableTable,
  { idleCode = 2 ** (table.bits - 1), rampWords = 0 }: OnceOptions,
): Int32Array {
  const levels = 2 ** table.bits;
  if (idleCode >= levels) {
    throw new Refusal({
      path: 'options.idleCode',
      value: showValue(idleCode),
      allowed: `a code of ${table.bits} bits, 0 to ${levels - 1}`,
    });
  }
  if (table.fold !== 'none') {
    throw new Refusal({
      path: 'table.fold',
      value: showValue(table.fold),
      allowed: '"none" with options.playback "once"',
    });
  }
  const shift = table.coding === 'twos-complement' ? levels / 2 : 0;
  const idle = (table.complement ? levels - 1 - idleCode : idleCode) - shift;
  const ramp = (from: number, to: number) =>
    Array.from({ length: rampWords }, (_, k) =>
      Math.floor(from + ((to - from) * (k + 1)) / (rampWords + 1) + 0.5),
    );
  const last = stored[stored.length - 1];
  return Int32Array.from([...ramp(idle, stored[0]), ...stored, ...ramp(last, idle), idle]);
}
