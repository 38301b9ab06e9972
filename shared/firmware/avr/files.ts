import { Refusal, showValue } from '../../contract/index.ts';
import { patternFiles } from '../pattern.ts';
import { accumulatorFacts } from '../playback-options.ts';
import { alignmentFacts } from '../storage-facts.ts';
import type { ExportInput, Facts, TargetFile } from '../target.ts';
import { accumulatorLoop, alignmentOf, type AccumulatorShape } from './accumulator-loop.ts';
import type { Line } from './assembly.ts';
import {
  handlerAlignment,
  onceHandler,
  phaseHandler,
  sumHandler,
  tableHandler,
  type PhaseShape,
} from './handler.ts';
import type { AvrOptions } from './options.ts';
import { portLoop, wholeLoopWords, type PortLoop } from './port-loop.ts';
import { loopPorts } from './ports.ts';
import { longestInstructionCycles, mainInstructionCycles, responseCycles, vectorCycles } from './response.ts';
import { keepsFlags, type LoopPort, type LoopShape } from './sample.ts';

/** Header, source and, unless the table alone is wanted, a main that plays it. */
export function avrFiles(input: ExportInput<AvrOptions>): TargetFile[] {
  const { layout, options } = input;
  const [{ bytes }] = layout.arrays;
  const storage = alignmentFacts(options);
  const isFlash = options.storage === 'flash';
  const playback = options.playback === 'none' ? undefined : playbackOf(input);
  const least = playback?.alignment ?? 0;
  const facts = {
    ...storage,
    alignment: Math.max(least, Number(storage.alignment)) || false,
    attribute: isFlash ? ' PROGMEM' : '',
    extraInclude: isFlash && '<avr/pgmspace.h>',
    fetchOpen: isFlash ? (bytes === 1 ? 'pgm_read_byte(&' : 'pgm_read_word(&') : '',
    fetchClose: isFlash ? ')' : '',
    readCast: isFlash && layout.arrays[0].signed ? `(${bytes === 1 ? 'int8_t' : 'int16_t'})` : '',
    ...playback?.facts,
  };
  return [
    { template: 'avr/header.h', ending: '.h', facts },
    { template: 'avr/source.c', ending: '.c', facts },
    ...(playback === undefined ? [] : [{ template: playback.template, ending: '_main.c', facts }]),
    ...patternFiles('avr', options.pulses),
  ];
}

interface Playback {
  readonly template: string;
  readonly facts: Facts;
  /** Boundary in bytes that the code needs the table on; 0 for none. */
  readonly alignment: number;
}

function playbackOf(input: ExportInput<AvrOptions>): Playback {
  const { table, layout, options } = input;
  const { definition } = table;
  if (definition.table.fold !== 'none') {
    refuse(
      'table.fold',
      definition.table.fold,
      '"none" for the target avr, unless options.playback is "none"',
    );
  }
  if (options.packed === 'yes') {
    refuse('options.packed', options.packed, '"no", unless options.playback is "none"');
  }
  const ports = loopPorts(table, layout, options);
  switch (options.playback) {
    case 'loop':
      return freeRunning(input, ports);
    case 'accumulator':
      return freeAccumulator(input, ports);
    default:
      return onInterrupts(input, ports);
  }
}

const shapeOf = ({ arrayName, options }: ExportInput<AvrOptions>, ports: readonly LoopPort[]): LoopShape => ({
  table: arrayName,
  load: options.storage === 'flash' ? 'lpm' : 'ld',
  ports,
});

function freeRunning(input: ExportInput<AvrOptions>, ports: readonly LoopPort[]): Playback {
  const { layout, options } = input;
  const shape = shapeOf(input, ports);
  const { elements } = layout.arrays[0];
  const { words, most } = wholeLoopWords(shape, elements.length);
  if (options.unroll === 'whole' && words > most) {
    const entries = Math.floor((most * elements.length) / words);
    refuse(
      'options.unroll',
      options.unroll,
      `"none" or "two" above ${entries} entries, as jumps reach no farther`,
    );
  }
  if (options.unroll === 'two' && !keepsFlags(shape)) {
    refuse(
      'options.unroll',
      options.unroll,
      '"none" or "whole" where words are masked or reserved pins are kept',
    );
  }
  const loop = portLoop(shape, elements, options.unroll);
  return { template: 'avr/loop.c', facts: loopFacts(loop, ports), alignment: 0 };
}

function freeAccumulator(input: ExportInput<AvrOptions>, ports: readonly LoopPort[]): Playback {
  const { table, options } = input;
  const shape: AccumulatorShape = {
    ...shapeOf(input, ports),
    accumulatorBits: Number(options.accumulatorBits) as 16 | 24 | 32,
    indexBits: Math.log2(table.stored.length),
  };
  // A length that is no power of two has no loop; `accumulatorFacts` says so.
  const loop = Number.isInteger(shape.indexBits) ? accumulatorLoop(shape) : { lines: [], cyclesPerWord: 1 };
  return {
    template: 'avr/accumulator.c',
    facts: { ...loopFacts(loop, ports), ...accumulatorFacts(table.definition, options, loop.cyclesPerWord) },
    alignment: alignmentOf(shape),
  };
}

function onInterrupts(input: ExportInput<AvrOptions>, ports: readonly LoopPort[]): Playback {
  const { table, layout, options } = input;
  const { playback, prescaler, compare, accumulatorBits } = options;
  const { bits, coding } = table.definition.table;
  const cyclesPerWord = Number(prescaler) * (compare + 1);
  if (playback === 'two-accumulators' && layout.map !== undefined) {
    refuse(
      'options.portMap',
      options.portMap,
      'nothing with options.playback "two-accumulators": sums have no map',
    );
  }
  const isSum = playback === 'two-accumulators';
  const count = table.stored.length;
  const accumulator =
    isSum || playback === 'timer-accumulator'
      ? accumulatorFacts(table.definition, options, cyclesPerWord)
      : undefined;
  const shape: PhaseShape = {
    ...shapeOf(input, ports),
    count,
    accumulatorBytes: (Number(accumulatorBits) / 8) as 2 | 3 | 4,
    indexBits: accumulator?.indexBits ?? 0,
  };
  const handler = isSum
    ? sumHandler(shape, { bits, isSigned: coding === 'twos-complement' })
    : accumulator !== undefined
      ? phaseHandler(shape)
      : playback === 'once'
        ? onceHandler(shape)
        : tableHandler(shape);
  const handlerCycles = responseCycles + vectorCycles + handler.cycles;
  const leastCycles = handlerCycles + mainInstructionCycles;
  if (cyclesPerWord < leastCycles) {
    refuse(
      'options.compare',
      compare,
      `at least ${Math.ceil(leastCycles / Number(prescaler)) - 1}: the handler takes ${handlerCycles} cycles of ${cyclesPerWord}`,
    );
  }
  return {
    template: 'avr/interrupt.c',
    alignment: accumulator === undefined ? 0 : handlerAlignment(shape),
    facts: {
      ...portFacts(ports),
      once: playback === 'once',
      isSum,
      rampWords: options.rampWords,
      playback,
      clockHz: options.clockHz,
      prescaler,
      clockSelect: ['1', '8', '64', '256', '1024'].indexOf(prescaler) + 1,
      compare,
      cyclesPerWord,
      handlerCycles,
      mainCycles: mainInstructionCycles,
      // An instruction that has begun ends first: from 1 cycle of it to all.
      entryVariesBy: mainInstructionCycles - 1,
      entryVariesWithCalls: longestInstructionCycles - 1,
      wordFetch:
        options.storage === 'ram' ? '' : layout.arrays[0].bytes === 1 ? 'pgm_read_byte' : 'pgm_read_word',
      halfWord: coding === 'twos-complement' ? 2 ** (bits - 1) : 0,
      assembly: handler.lines.map(inC).join('\n'),
      accumulatorBytes: shape.accumulatorBytes,
      ...accumulator,
    },
  };
}

const hex = (value: number) => `0x${value.toString(16).toUpperCase().padStart(2, '0')}`;

function portFacts(ports: readonly LoopPort[]): Facts {
  const facts = ports.map(({ letter, driven, isMasked, isKept }, k) => ({
    letter,
    lower: letter.toLowerCase(),
    shift: 8 * k,
    driven: hex(driven),
    others: hex(0xff & ~driven),
    isMasked,
    isKept,
    isWhole: driven === 0xff,
  }));
  // The upper byte goes out first; for an instant, the pins show bits of two words.
  return { ports: facts.reverse() };
}

const loopFacts = ({ lines, cyclesPerWord }: PortLoop, ports: readonly LoopPort[]): Facts => ({
  ...portFacts(ports),
  cyclesPerWord,
  assembly: lines.map(inC).join('\n'),
});

/** A line of assembly as a C string of its own; its cycles stay out: they are those of a way, not of a line. */
const inC = ({ text }: Line) =>
  text.endsWith(':') ? `        "${text}\\n\\t"` : `            "${text}\\n\\t"`;

function refuse(path: string, value: unknown, allowed: string): never {
  throw new Refusal({ path, value: showValue(value), allowed });
}
