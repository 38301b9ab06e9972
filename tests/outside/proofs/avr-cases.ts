import type { DefinitionInput } from '../../../shared/contract/index.ts';
import { tone } from '../support/tables.ts';
import { tableCases } from './cases.ts';
import { accumulated, playedOnce, summed } from './played.ts';

/** A table that a part plays, and the words that its ports have to show. */
export interface Playing {
  readonly title: string;
  readonly definition: DefinitionInput;
  readonly options: Readonly<Record<string, string>>;
  readonly places?: readonly string[];
  /** Words that are played, in order, from those of one round. */
  readonly played: (words: number[]) => number[];
}

const thrice = (words: number[]) => [...words, ...words, ...words];
const { mapped, signed } = tableCases;
const onePort = {
  definition: tone({ length: 256, bits: 6 }),
  options: { portMap: 'B.0 B.1 B.3 B.4 B.5 B.6', reservedPins: 'B.2=high B.7=low' },
};

export const loops: readonly Playing[] = [
  { title: '256 × 8', definition: tone({}), options: {}, played: thrice },
  { title: '100 × 8', definition: tone({ length: 100 }), options: {}, played: thrice },
  { title: '3 × 8', definition: tone({ length: 3 }), options: {}, played: thrice },
  { title: '261 × 8', definition: tone({ length: 261 }), options: {}, played: thrice },
  { title: '1024 × 8', definition: tone({ length: 1024 }), options: {}, played: thrice },
  {
    title: '1024 × 16 on two ports',
    definition: tone({ length: 1024, bits: 16 }),
    options: {},
    played: thrice,
  },
  { title: `${signed.title} on two ports`, definition: signed.definition, options: {}, played: thrice },
  { title: '64 × 8 in RAM', definition: tone({ length: 64 }), options: { storage: 'ram' }, played: thrice },
  { title: '256 × 8, unrolled by two', definition: tone({}), options: { unroll: 'two' }, played: thrice },
  {
    title: '1001 × 8, unrolled by two',
    definition: tone({ length: 1001 }),
    options: { unroll: 'two' },
    played: thrice,
  },
  { title: '256 × 8, unrolled whole', definition: tone({}), options: { unroll: 'whole' }, played: thrice },
  {
    title: '100 × 12 on two ports, unrolled whole',
    definition: tone({ length: 100, bits: 12 }),
    options: { unroll: 'whole' },
    played: thrice,
  },
  { ...mapped, played: thrice },
  {
    ...mapped,
    title: `${mapped.title} and kept`,
    options: { ...mapped.options, reservedBy: 'kept' },
    played: thrice,
  },
  {
    ...onePort,
    title: '256 × 6 on one port, two pins reserved',
    places: onePort.options.portMap.split(' '),
    played: thrice,
  },
  {
    ...onePort,
    title: '256 × 6 on one port, two pins kept',
    places: onePort.options.portMap.split(' '),
    options: { ...onePort.options, reservedBy: 'kept' },
    played: thrice,
  },
];

const clockHz = 8_000_000;
export const loopRate = (cyclesPerWord: number) => ({ clockHz, cyclesPerWord, milliHz: 2_000_123 });
export const accumulators = [
  { title: '256 × 8, 24 bits', definition: tone({}), bits: 24, cyclesPerWord: 9 },
  { title: '256 × 8, 16 bits', definition: tone({}), bits: 16, cyclesPerWord: 8 },
  { title: '256 × 8, 32 bits', definition: tone({}), bits: 32, cyclesPerWord: 10 },
  { title: '64 × 8, 24 bits', definition: tone({ length: 64 }), bits: 24, cyclesPerWord: 13 },
  {
    title: '1024 × 12 on two ports, 24 bits',
    definition: tone({ length: 1024, bits: 12 }),
    bits: 24,
    cyclesPerWord: 28,
  },
];

/** A table that a handler plays, a word each so many cycles: as many as bring the timer to every cycle of main's loop. */
export interface TimedPlaying extends Playing {
  readonly playback: string;
  readonly cyclesPerWord: number;
}

const ratesAt = (cyclesPerWord: number) =>
  [440_000, 550_000].map((milliHz) => ({ clockHz, cyclesPerWord, milliHz }));
const [rate, secondRate] = ratesAt(501);
const [evenRate, secondEvenRate] = ratesAt(500);

export const onTimer: readonly TimedPlaying[] = [
  {
    playback: 'timer',
    cyclesPerWord: 501,
    title: '256 × 8',
    definition: tone({}),
    options: {},
    played: thrice,
  },
  {
    playback: 'timer',
    cyclesPerWord: 501,
    title: '100 × 8',
    definition: tone({ length: 100 }),
    options: {},
    played: thrice,
  },
  {
    playback: 'timer',
    cyclesPerWord: 500,
    title: '300 × 12 on two ports',
    definition: tone({ length: 300, bits: 12 }),
    options: {},
    played: thrice,
  },
  {
    playback: 'timer',
    cyclesPerWord: 501,
    ...mapped,
    title: `${mapped.title} and kept`,
    options: { ...mapped.options, reservedBy: 'kept' },
    played: thrice,
  },
  {
    playback: 'timer-accumulator',
    cyclesPerWord: 501,
    title: '256 × 8',
    definition: tone({}),
    options: {},
    played: (words) => accumulated(words, 24, rate, 400),
  },
  {
    playback: 'timer-accumulator',
    cyclesPerWord: 501,
    title: '512 × 10 in two’s complement, 32 bits',
    definition: tone({ length: 512, bits: 10, coding: 'twos-complement' }),
    options: { accumulatorBits: '32' },
    played: (words) => accumulated(words, 32, rate, 400),
  },
  {
    playback: 'two-accumulators',
    cyclesPerWord: 500,
    title: '256 × 8',
    definition: tone({}),
    options: {},
    played: (words) => summed(words, 24, evenRate, secondEvenRate, 400),
  },
  {
    playback: 'two-accumulators',
    cyclesPerWord: 501,
    title: '128 × 12 in two’s complement',
    definition: tone({ length: 128, bits: 12, coding: 'twos-complement' }),
    options: {},
    played: (words) =>
      summed(
        words.map((word) => word + 2048),
        24,
        rate,
        secondRate,
        300,
      ).map((code) => code - 2048),
  },
  {
    playback: 'once',
    cyclesPerWord: 501,
    title: '100 × 8',
    definition: tone({ length: 100 }),
    options: { rampWords: '9', idleCode: '30' },
    played: (words) => playedOnce(words, 30, 9),
  },
];
