import { z } from 'zod';
import { Refusal, showValue } from '../contract/index.ts';
import type { ExportableTable } from './exportable-table.ts';
import { layOut, patternOf, type Layout } from './layout.ts';
import {
  numberOptions,
  packedOption,
  portMapOptions,
  sharedOptions,
  storageOptions,
  wholeNumberOption,
  wordOption,
} from './options.ts';
import { patternFiles, pulsesOption } from './pattern.ts';
import { accumulatorFacts, playbackOptions } from './playback-options.ts';
import { alignmentFacts } from './storage-facts.ts';
import type { ExportInput, Facts, SharedOptions, TargetFile } from './target.ts';
import { wordTypeOf } from './word-type.ts';

/** Playback in portable C: which entry is next, without anything of a processor. */
const portablePlaybacks = ['none', 'timer', 'timer-accumulator', 'two-accumulators', 'once', 'dma'] as const;

const allPlaybacks = [
  'none',
  'loop',
  'timer',
  'timer-accumulator',
  'two-accumulators',
  'once',
  'dma',
] as const;
type CPlayback = (typeof allPlaybacks)[number];

const dmaBitsOption = wordOption(['8', '16', '32'])
  .default('16')
  .describe('dma: bits of an element, as the converter’s data register or the port takes them');

const tableOptions = {
  ...sharedOptions,
  ...numberOptions,
  ...storageOptions,
  packed: packedOption,
  ...portMapOptions,
  pulses: pulsesOption,
};

const countsPerWord = wholeNumberOption(1, 2 ** 24)
  .default(500)
  .describe('clock counts of the timer from one word to the next');

/** Options of C for any processor. */
export const portableOptions = z.strictObject({
  ...tableOptions,
  playback: wordOption(portablePlaybacks)
    .default('none')
    .describe(
      'what plays: nothing, a step for your timer’s handler, the same with one or two phase accumulators, the wave once, or a table for DMA',
    ),
  ...playbackOptions,
  countsPerWord,
  dmaBits: dmaBitsOption,
});

/** Options of C for a processor whose timer is known. */
export const processorOptions = z.strictObject({
  ...tableOptions,
  portAddress: z
    .string({ error: 'an address as 0x40020C14' })
    .regex(/^(?:0x[0-9A-Fa-f]{1,8}(?:[ ,]+0x[0-9A-Fa-f]{1,8})*)?$/, {
      error: 'addresses as 0x40020C14, one for each port in the order of their names',
    })
    .default('')
    .describe('address of the output register, or one for each port of the map in the order of their names'),
  playback: wordOption(allPlaybacks)
    .default('none')
    .describe(
      'what plays: nothing, a free-running loop, a timer interrupt, the same with one or two phase accumulators, the wave once, or a table for DMA',
    ),
  ...playbackOptions,
  countsPerWord,
  dmaBits: dmaBitsOption,
});

type COptions = Omit<z.output<typeof portableOptions>, 'playback'> & {
  readonly playback: CPlayback;
  readonly portAddress?: string;
};

/** As `layOut`; for DMA in elements of the width asked for, unsigned, as no processor extends a sign on the way. */
export function layOutForC(table: ExportableTable, given: SharedOptions): Layout {
  const options = given as COptions;
  const layout = layOut(table, options);
  if (options.playback !== 'dma') return layout;
  if (options.packed === 'yes') refuse('options.packed', options.packed, '"no" with options.playback "dma"');
  const bytes = (Number(options.dmaBits) / 8) as 1 | 2 | 4;
  const arrays = layout.arrays.map((array) => {
    if (array.bytes > bytes) {
      refuse('options.dmaBits', options.dmaBits, `at least ${8 * array.bytes} for these words`);
    }
    const levels = 2 ** table.definition.table.bits;
    const pattern = (word: number) => (array.ports.length > 0 ? word : patternOf(word, 4) % levels);
    return { ...array, elements: array.elements.map(pattern), bytes, signed: false };
  });
  return {
    ...layout,
    arrays,
    byteCount: arrays.reduce((sum, { elements }) => sum + elements.length * bytes, 0),
  };
}

/** Header and source, and what plays them where that is asked for. */
export function cFiles(folder: 'c99' | 'cortex-m' | 'riscv', input: ExportInput<COptions>): TargetFile[] {
  const { options } = input;
  const facts: Facts = { ...alignmentFacts(options), ...playbackFacts(input) };
  const hasCode = options.playback !== 'none' && options.playback !== 'dma';
  return [
    { template: `${folder}/header.h`, ending: '.h', facts },
    { template: `${folder}/source.c`, ending: '.c', facts },
    ...(hasCode
      ? [
          { template: `${folder}/play.h`, ending: '_play.h', facts },
          { template: `${folder}/play.c`, ending: '_play.c', facts },
        ]
      : []),
    ...patternFiles('c', options.pulses),
  ];
}

function playbackFacts({ table, layout, options }: ExportInput<COptions>): Facts {
  const { playback, countsPerWord: counts, rampWords } = options;
  const { length, fold } = table.definition.table;
  if (playback === 'none') return { playback, dma: false };
  if (playback === 'dma') {
    if (fold !== 'none') refuse('table.fold', fold, '"none" with options.playback "dma"');
    return { playback, dma: true };
  }
  const isTwo = playback === 'two-accumulators';
  if (isTwo && layout.map !== undefined) {
    refuse(
      'options.portMap',
      options.portMap,
      'nothing with options.playback "two-accumulators": sums have no map',
    );
  }
  const entries = playback === 'once' ? table.stored.length : length;
  return {
    playback,
    dma: false,
    once: playback === 'once',
    isTwo,
    rampWords,
    entries,
    indexType: entries <= 256 ? 'uint8_t' : 'uint16_t',
    wrapsByItself: entries === 256 || entries === 65_536,
    countsPerWord: counts,
    clockHz: options.clockHz,
    addresses: addressesOf(layout, options),
    outputType: wordTypeOf(table.definition.table).bytes === 1 ? 'uint8_t' : 'uint16_t',
    ...(isTwo || playback === 'timer-accumulator' ? accumulatorFacts(table.definition, options, counts) : {}),
  };
}

/** Addresses of the output registers in the order of the arrays; none where the code has no port. */
function addressesOf(layout: Layout, { portAddress }: COptions): string[] {
  if (portAddress === undefined) return [];
  const addresses = portAddress.split(/[ ,]+/).filter(Boolean);
  if (addresses.length !== layout.arrays.length) {
    const many = layout.arrays.length === 1 ? 'one address' : `${layout.arrays.length} addresses`;
    refuse('options.portAddress', portAddress, `${many}, as 0x40020C14, for this playback`);
  }
  return addresses;
}

function refuse(path: string, value: unknown, allowed: string): never {
  throw new Refusal({ path, value: showValue(value), allowed });
}
