import type { Definition } from '../../../../shared/contract/index.ts';
import { equallyLoud } from '../../../../shared/listening/equal-loudness.ts';
import { sampleRateOfTone, type Sound, type Voice } from '../../../audio/index.ts';

interface Compared {
  /** What the codes stand for, one value an entry. */
  readonly values: Float64Array;
  readonly table: Pick<Definition['table'], 'length' | 'cycles' | 'range'>;
}

export type Matched =
  | {
      readonly kind: 'matched';
      /** Voices `a` and `b` in step, each driven so that it gives the tone. */
      readonly sound: Sound;
      /** By how much each is turned down, in dB; one of them by 0. */
      readonly turnedDownDb: { readonly a: number; readonly b: number };
    }
  /** One of them does not swing, so that nothing makes them equally loud. */
  | { readonly kind: 'silent'; readonly which: 'a' | 'b' | 'both' };

/**
 * Brings two tables to one tone and one loudness: each is played as its pin's staircase, and the one with the larger RMS
 * of what is heard is turned down to the other's. Nothing is turned up, so that neither is louder than alone.
 *
 * @param toneHz tone of both loops, in hertz
 * @param contextRateHz what lies above half of it is neither heard nor weighed
 */
export function matchLoudness(a: Compared, b: Compared, toneHz: number, contextRateHz: number): Matched {
  const [voiceA, voiceB] = [voiceOf(a, toneHz), voiceOf(b, toneHz)];
  const matched = equallyLoud(voiceA, voiceB, voiceA.drive, contextRateHz);
  if (matched.kind === 'silent') return matched;
  return {
    kind: 'matched',
    sound: { voices: { a: matched.a, b: matched.b }, drive: voiceA.drive },
    turnedDownDb: matched.turnedDownDb,
  };
}

function voiceOf({ values, table }: Compared, toneHz: number) {
  const { length: tableLength, cycles: tableCycles, range } = table;
  return {
    // A unipolar table's full scale, half as wide, is made as wide as a bipolar one's.
    values: range === 'unipolar' ? values.map((value) => 2 * value) : values,
    cycles: tableCycles,
    form: 'staircase',
    drive: { kind: 'loop', sampleRateHz: sampleRateOfTone(toneHz, { tableLength, tableCycles }) },
  } as const satisfies Voice;
}
