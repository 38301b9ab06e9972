import type { DefinitionInput } from '../../../shared/contract/index.ts';
import { sine, tone } from '../support/tables.ts';
import { tableCases } from './cases.ts';
import { accumulated, playedOnce, summed } from './played.ts';

/** A table that a processor plays from, and the words that its ports have to show, in order. */
export interface PlayedCase {
  readonly playback: 'loop' | 'timer' | 'timer-accumulator' | 'two-accumulators' | 'once' | 'dma';
  readonly title: string;
  readonly definition: DefinitionInput;
  readonly options: Readonly<Record<string, string>>;
  /** The places that the map's bits have, bit 0 first; absent without a map. */
  readonly places?: readonly string[];
  /** What reserved pins show that rest high, by port; nothing where they are kept. */
  readonly rest?: Readonly<Record<string, number>>;
  /** From the words of one round. */
  readonly played: (words: number[]) => number[];
}

type Table = Omit<PlayedCase, 'playback' | 'played'>;

const { mapped, mappedFold, packed12, packed4 } = tableCases;

const plain = (length: number): Table => ({
  title: `${length} × 8`,
  definition: tone({ length }),
  options: {},
});
const wide: Table = {
  title: '1024 × 16',
  definition: tone({ length: 1024, bits: 16 }),
  options: {},
};
const signed: Table = {
  title: '100 × 12 in two’s complement',
  definition: tone({ length: 100, bits: 12, coding: 'twos-complement' }),
  options: {},
};
const quarter: Table = {
  title: 'first quarter of 256 × 8',
  definition: sine({ sampleAt: 'centre', fold: 'quarter' }),
  options: {},
};
const withRest = (table: Table): Table => ({ ...table, rest: { B: 2 ** 2 } });
const kept = (table: Table): Table => ({
  ...table,
  title: `${table.title} and kept`,
  options: { ...table.options, reservedBy: 'kept' },
});

const placesOn = (port: string, from: number, count: number) =>
  Array.from({ length: count }, (_, bit) => `${port}.${from + bit}`);

/** As converters take 12 bits on 16 pins: the uppermost on the top pin. */
const left: Table = {
  title: '100 × 12 left-aligned on 16 pins, two pins reserved',
  definition: tone({ length: 100, bits: 12 }),
  options: { portMap: placesOn('A', 4, 12).join(' '), reservedPins: 'A.0=high A.3=low' },
  places: placesOn('A', 4, 12),
  rest: { A: 1 },
};
/** The word on pins 14 to 25 of 32. */
const high: Table = {
  title: '1024 × 12 on pins 14 to 25, two pins reserved and kept',
  definition: tone({ length: 1024, bits: 12 }),
  options: {
    portMap: placesOn('C', 14, 12).join(' '),
    reservedPins: 'C.2=high C.31=low',
    reservedBy: 'kept',
  },
  places: placesOn('C', 14, 12),
};

/** Counts of the timer from word to word. */
export const countsPerWord = 4000;
const rate = { clockHz: 8_000_000, cyclesPerWord: countsPerWord, milliHz: 440_000 };
const second = { ...rate, milliHz: 550_000 };
const samples = 400;

/** Two rounds and a bit of a third: the seam twice. */
const rounds = (words: number[]) => [...words, ...words, ...words.slice(0, 9)];

const ofPlayback =
  (playback: PlayedCase['playback'], played: PlayedCase['played'] = rounds) =>
  (table: Table, more: Partial<PlayedCase> = {}): PlayedCase => ({
    ...table,
    playback,
    played,
    ...more,
  });
const inLoop = ofPlayback('loop');
const onTimer = ofPlayback('timer');
const byDma = ofPlayback('dma');

function withPhase(table: Table, bits: 16 | 24 | 32): PlayedCase {
  return {
    ...table,
    playback: 'timer-accumulator',
    title: bits === 24 ? table.title : `${table.title}, ${bits} bits`,
    options: { ...table.options, accumulatorBits: String(bits) },
    played: (words) => accumulated(words, bits, rate, samples),
  };
}

/** Half the sum of two codes; in two's complement, `half` the levels lie between codes and words. */
const inSum = (table: Table, half = 0): PlayedCase => ({
  ...table,
  playback: 'two-accumulators',
  played: (words) =>
    summed(
      words.map((word) => word + half),
      24,
      rate,
      second,
      samples,
    ).map((code) => code - half),
});

function once(table: Table, idleCode: number, half = 0): PlayedCase {
  const rampWords = 9;
  const idle = idleCode - half;
  return {
    ...table,
    playback: 'once',
    options: { ...table.options, rampWords: String(rampWords), idleCode: String(idleCode) },
    // Interrupts go on, and the output stays.
    played: (words) => [...playedOnce(words, idle, rampWords), idle, idle, idle],
  };
}

/** Elements of so many bits, as a channel moves them. */
const dma = (table: Table, dmaBits: 8 | 16 | 32): PlayedCase =>
  byDma({
    ...table,
    title: `${table.title} in elements of ${dmaBits} bits`,
    options: { ...table.options, dmaBits: String(dmaBits) },
  });

const power = (bits: number, coding: 'offset-binary' | 'twos-complement'): Table => ({
  title: `128 × ${bits}${coding === 'twos-complement' ? ' in two’s complement' : ''}`,
  definition: tone({ length: 128, bits, coding }),
  options: {},
});

export const playedCases: readonly PlayedCase[] = [
  inLoop(plain(256)),
  inLoop(plain(100)),
  inLoop(plain(1024)),
  inLoop(wide),
  inLoop(signed),
  inLoop(quarter),
  inLoop(packed12),
  inLoop(packed4),
  inLoop(left),
  inLoop(high),
  inLoop(withRest(mapped)),
  inLoop(kept(mapped)),
  inLoop(withRest(mappedFold)),
  onTimer(plain(256)),
  onTimer(plain(100)),
  onTimer(plain(1024)),
  onTimer(wide),
  onTimer(signed),
  onTimer(quarter),
  onTimer(packed12),
  onTimer(packed4),
  onTimer(left),
  onTimer(high),
  onTimer(withRest(mapped)),
  onTimer(kept(mapped)),
  onTimer(kept(mappedFold)),
  withPhase(plain(256), 24),
  withPhase(plain(1024), 16),
  withPhase(wide, 32),
  withPhase(quarter, 24),
  withPhase(withRest(mapped), 24),
  withPhase(kept(mapped), 24),
  inSum(plain(256)),
  inSum(wide),
  inSum(power(12, 'twos-complement'), 2048),
  inSum(quarter),
  once(plain(100), 128),
  once(wide, 40_000),
  once(signed, 1000, 2048),
  once(packed12, 1000, 2048),
  once(left, 3000),
  once(kept(mapped), 600),
  dma(plain(256), 8),
  dma(signed, 16),
  dma(wide, 16),
  dma(plain(100), 32),
  dma(withRest(mapped), 8),
];
