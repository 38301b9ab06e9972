import { analyseTable } from '../analysis/index.ts';
import type { TableSettings } from '../contract/index.ts';
import { levelsOf, valuesOf } from '../quantiser/index.ts';
import type { Sound, Voice } from './sound.ts';

/** A set of bits that are off: bit i of the number stands for bit i of the codes, 0 = least significant. */
export type BitMask = number;

/** The lowest `count` bits, 0…16. */
export function lowestBits(count: number): BitMask {
  return 2 ** count - 1;
}

/** How many bits are off from bit 0 upwards without a gap. */
export function offFromBottom(off: BitMask): number {
  let count = 0;
  while ((off >> count) % 2 === 1) count += 1;
  return count;
}

/**
 * Codes with some bits off: each of them reads 0 in every code, as a pin does that rests low. These are codes before
 * complement and coding (engine specification §3.6): behind an inverting driver it is the output that rests low.
 */
export function codesWithBitsOff(codes: Uint16Array, off: BitMask): Uint16Array {
  const kept = ~off;
  const left = new Uint16Array(codes.length);
  for (let k = 0; k < codes.length; k += 1) left[k] = codes[k] & kept;
  return left;
}

/** What each code of a table stands for at full scale ±1, as voices have it: a unipolar table's values come doubled. */
export function levelsOfTable(table: TableSettings): Float64Array {
  const everyCode = Uint16Array.from({ length: levelsOf(table.bits) }, (_, code) => code);
  const levels = valuesOf(everyCode, table);
  if (table.range === 'unipolar') for (let code = 0; code < levels.length; code += 1) levels[code] *= 2;
  return levels;
}

/** Voltages of a converter at full scale ±1: the lowest −1, the highest 1. They must not all be the same. */
export function levelsOfVolts(volts: Float64Array): Float64Array {
  let low = Infinity;
  let high = -Infinity;
  for (const level of volts) {
    low = Math.min(low, level);
    high = Math.max(high, level);
  }
  return volts.map((level) => (2 * (level - low)) / (high - low) - 1);
}

/**
 * A sound in which bits are off in every voice that is made of codes; its other voices stay as they are.
 *
 * @param codes of the table, one an entry
 * @param levels by the name of a voice, what each of the 2^b codes stands for in it
 */
export function soundWithBitsOff(
  sound: Sound,
  codes: Uint16Array,
  levels: Readonly<Record<string, Float64Array>>,
  off: BitMask,
): Sound {
  const left = codesWithBitsOff(codes, off);
  // Voices that follow the same levels share their values, as a ladder and what stands behind it do.
  const made = new Map<Float64Array, Float64Array>();
  const voices: Record<string, Voice> = { ...sound.voices };
  for (const [name, voice] of Object.entries(sound.voices)) {
    const own = levels[name];
    if (own === undefined) continue;
    const values = made.get(own) ?? Float64Array.from(left, (code) => own[code]);
    made.set(own, values);
    voices[name] = { ...voice, values };
  }
  return { ...sound, voices };
}

/** What is measured. The cycle is the levelled one that the codes were made from. */
export interface CodedTable {
  readonly codes: Uint16Array;
  readonly cycle: Float64Array;
  readonly table: TableSettings;
}

/** What bits that are off leave, by the report's own definitions (engine specification §4). */
export interface BitsOffFigures {
  /** `null` where it does not exist: nothing is left that swings, or nothing is added to it. */
  readonly sinadDb: number | null;
  /** The strongest line that rounding and the missing bits added, against the strongest of the cycle. */
  readonly unwantedDb: number | null;
  /** Whether the strongest line, which SINAD takes for the carrier, is no longer the cycle's own strongest. */
  readonly isOtherLine: boolean;
}

/** Amplitudes this close count as equally strong. */
const equalAmplitude = 1e-9;

/** Figures of a table whose codes lack some bits: with none off, those of its report to the last bit. */
export function bitsOffFigures({ codes, cycle, table }: CodedTable, off: BitMask): BitsOffFigures {
  const left = { codes: codesWithBitsOff(codes, off), clippedCodes: 0 };
  const { report, spectrum } = analyseTable({ cycle, clippedSamples: 0 }, left, table);
  const { amplitudes, intended } = spectrum;
  let own = 1;
  for (let k = 2; k < intended.length; k += 1) if (intended[k] > intended[own] + equalAmplitude) own = k;
  let strongest = 0;
  for (let k = 1; k < amplitudes.length; k += 1) strongest = Math.max(strongest, amplitudes[k]);
  return {
    sinadDb: report.sinadDb,
    unwantedDb: report.unwantedDb,
    isOtherLine: strongest > amplitudes[own] + equalAmplitude,
  };
}

/** Every mask that is asked about for b bits: none off, each bit alone, and 2…b−1 from the bottom up. */
export function masksOf(bits: number): BitMask[] {
  const masks: BitMask[] = [0];
  for (let bit = 0; bit < bits; bit += 1) masks.push(2 ** bit);
  for (let count = 2; count < bits; count += 1) masks.push(lowestBits(count));
  return masks;
}
