import { limits, type Definition } from '../../../../../shared/contract/index.ts';
import { driveAtTone, toneHzOf, type Drive } from '../../../../../shared/listening/index.ts';
import { centsBetween } from '../../../../../shared/playback/index.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { sayCents } from '../../rates/read-tone.ts';
import type { SideChoice } from './side-choice.ts';

/** What is on the bench, and how it is driven; not as a single pass. */
export interface OnBench {
  readonly definition: Definition;
  readonly drive: Drive;
}

/** A stored revision with the name of its table. */
export interface StoredDefinition {
  readonly definition: Definition;
  readonly words: string;
}

/** How one of the two is come by. */
export type SidePlan =
  /** From the table on the bench as it is. */
  | { readonly kind: 'own'; readonly form: 'curve' | 'staircase'; readonly words: string }
  /** From a table to be built, driven otherwise where its length or rate is another. */
  | {
      readonly kind: 'build';
      readonly definition: Definition;
      readonly drive?: Drive;
      readonly words: string;
      readonly note?: string;
    }
  | { readonly kind: 'waiting' }
  | { readonly kind: 'fault'; readonly fault: string };

const hertz = (hz: number) => formatQuantity(hz, 'Hz', { significant: 5 });
const fault = (words: string): SidePlan => ({ kind: 'fault', fault: words });
export const sayBits = (bits: number) => `${bits} ${bits === 1 ? 'bit' : 'bits'}`;

/** Bits that are taken where none were chosen. */
export const usualBits = (bits: number) => Math.max(1, bits - 2);

/** The other sample rate that is taken where none was chosen: half as high, to whole hertz. */
export const usualRateHz = ({ sampleRateHz }: Drive) => Math.max(1, Math.round(sampleRateHz / 2));

/**
 * @param stored the picked revision; null while it is not there
 */
export function planSide(choice: SideChoice, bench: OnBench, stored: StoredDefinition | null): SidePlan {
  const { table } = bench.definition;
  switch (choice.kind) {
    case 'ideal':
      return { kind: 'own', form: 'curve', words: 'the ideal curve' };
    case 'table':
      return { kind: 'own', form: 'staircase', words: `the table of ${sayBits(table.bits)}` };
    case 'fewer':
      return planFewer(choice.bits ?? usualBits(table.bits), bench.definition);
    case 'rate':
      return planRate(choice.sampleRateHz ?? usualRateHz(bench.drive), bench);
    case 'revision':
      if (choice.picked === null) return fault('Choose a table and one of its revisions.');
      return stored === null ? { kind: 'waiting' } : planRevision(stored, bench);
  }
}

/** The same wave quantised to fewer bits. Which entries are stored makes no difference to the ear. */
function planFewer(bits: number, definition: Definition): SidePlan {
  const { table } = definition;
  if (table.levels !== undefined) {
    return fault(`The measured levels are those of ${sayBits(table.bits)}: there are none for fewer.`);
  }
  if (bits >= table.bits) {
    return fault(
      table.bits === 1
        ? 'The table has a single bit: there are no fewer.'
        : `${bits} is not allowed; allowed: a whole number from 1 to ${table.bits - 1}, fewer than the table has.`,
    );
  }
  return {
    kind: 'build',
    definition: { ...definition, table: { ...table, bits, fold: 'none' } },
    words: `the wave at ${sayBits(bits)}`,
  };
}

function planRate(wantedHz: number, bench: OnBench): SidePlan {
  const { definition, drive } = bench;
  const { length, cycles } = definition.table;
  const toneHz = toneHzOf(drive, length, cycles);
  return drive.kind === 'accumulator'
    ? planAccumulatorRate(wantedHz, toneHz, definition, drive)
    : planLoopRate(wantedHz, toneHz, definition);
}

/** The table at the length that gives the tone at nearly the wanted rate, `N' = fs'·K/tone` rounded. */
function planLoopRate(wantedHz: number, toneHz: number, definition: Definition): SidePlan {
  const { table } = definition;
  const perEntry = toneHz / table.cycles;
  const length = Math.round(wantedHz / perEntry);
  const least = 2 * table.cycles + 1;
  const most = limits.tableLength.max;
  if (length < least || length > most) {
    return fault(
      `At ${hertz(wantedHz)} a round of this tone has ${length.toLocaleString('en')} entries; allowed: ${least} to ${most.toLocaleString('en')}, sample rates from ${hertz(least * perEntry)} to ${hertz(most * perEntry)}.`,
    );
  }
  const sampleRateHz = length * perEntry;
  return {
    kind: 'build',
    definition: { ...definition, table: { ...table, length, fold: 'none' } },
    drive: { kind: 'loop', sampleRateHz },
    words: `the table at ${hertz(sampleRateHz)}`,
    note: `${length.toLocaleString('en')} entries give the same tone, ${hertz(toneHz)}, at ${hertz(sampleRateHz)}.`,
  };
}

/** The same table and accumulator at another rate, with the step word nearest to the tone. */
function planAccumulatorRate(
  wantedHz: number,
  toneHz: number,
  definition: Definition,
  drive: Extract<Drive, { kind: 'accumulator' }>,
): SidePlan {
  const { length, cycles } = definition.table;
  const roundHz = toneHz / cycles;
  if (!(2 * roundHz < wantedHz) || Math.round((roundHz / wantedHz) * 2 ** drive.accumulatorBits) < 1) {
    return fault(
      `No step word gives ${hertz(roundHz)} at ${hertz(wantedHz)}; allowed: sample rates above ${hertz(2 * roundHz)} at which the word is 1 or more.`,
    );
  }
  const other = driveAtTone({ ...drive, sampleRateHz: wantedHz }, length, cycles, toneHz);
  const stepWord = other.kind === 'accumulator' ? other.stepWord : 0;
  const playedHz = toneHzOf(other, length, cycles);
  return {
    kind: 'build',
    definition,
    drive: other,
    words: `the table at ${hertz(wantedHz)}`,
    note: `Step word ${stepWord.toLocaleString('en')} gives ${hertz(playedHz)}, ${sayCents(centsBetween(playedHz, toneHz))}.`,
  };
}

/** A revision at the bench's tone. Where the accumulator cannot index it, it goes round as a loop. */
function planRevision({ definition, words }: StoredDefinition, bench: OnBench): SidePlan {
  const { length, cycles } = definition.table;
  const own = bench.definition.table;
  const toneHz = toneHzOf(bench.drive, own.length, own.cycles);
  const indexBits = Math.log2(length);
  const { drive } = bench;
  const isLoop =
    drive.kind !== 'accumulator' || !(Number.isInteger(indexBits) && indexBits <= drive.accumulatorBits);
  const plain: Drive = isLoop ? { kind: 'loop', sampleRateHz: drive.sampleRateHz } : drive;
  const played = driveAtTone(plain, length, cycles, toneHz);
  const how = isLoop && drive.kind === 'accumulator' ? ' as a loop, since its length is no power of two' : '';
  return {
    kind: 'build',
    definition,
    drive: played,
    words,
    note: `Played at the bench’s tone, ${hertz(toneHzOf(played, length, cycles))}${how}.`,
  };
}
