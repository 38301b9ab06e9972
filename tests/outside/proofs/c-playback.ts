import type { DefinitionInput } from '../../../shared/contract/index.ts';
import { strictWarnings } from '../support/compilers.ts';
import { inFolder, run } from '../support/programs.ts';
import { exported, sine, tone } from '../support/tables.ts';
import { everyWarning } from './c-programs.ts';
import { expectedOf, mustEqual, tableCases } from './cases.ts';
import { accumulated, playedOnce, summed } from './played.ts';
import type { Proof } from './proof.ts';

const rate = { clockHz: 8_000_000, cyclesPerWord: 500, milliHz: 440_000 };
const second = { ...rate, milliHz: 550_000 };
const folded = sine({ length: 128, sampleAt: 'centre', fold: 'quarter' });
const signed = tone({ length: 64, bits: 12, coding: 'twos-complement' });

interface Playing {
  readonly title: string;
  readonly definition: DefinitionInput;
  readonly options: Readonly<Record<string, string>>;
  /** The places that the map's bits have, bit 0 first; absent without a map. */
  readonly places?: readonly string[];
  /** C for the next word, with NAME for the array's and `e` for an entry; of two ports, 256 times the second's added. */
  readonly next: string;
  readonly wanted: (words: number[]) => number[];
}

const kinds: Playing[] = [
  {
    title: 'timer, 256 × 8',
    definition: tone({}),
    options: { playback: 'timer' },
    next: 'NAME[NAME_next_entry()]',
    wanted: (words) => [...words, ...words],
  },
  {
    title: 'timer, 65,536 × 8',
    definition: tone({ length: 65_536 }),
    options: { playback: 'timer' },
    next: 'NAME[NAME_next_entry()]',
    wanted: (words) => [...words, ...words.slice(0, 100)],
  },
  {
    title: 'timer, 100 × 8',
    definition: tone({ length: 100 }),
    options: { playback: 'timer' },
    next: 'NAME[NAME_next_entry()]',
    wanted: (words) => [...words, ...words],
  },
  {
    title: 'timer, first quarter of 128 × 8',
    definition: folded,
    options: { playback: 'timer' },
    next: 'NAME_word(NAME_next_entry())',
    wanted: (words) => [...words, ...words],
  },
  ...(['16', '24', '32'] as const).map((accumulatorBits): Playing => ({
    title: `timer-accumulator of ${accumulatorBits} bits, 64 × 12 in two’s complement`,
    definition: signed,
    options: { playback: 'timer-accumulator', accumulatorBits },
    next: 'NAME[NAME_next_entry()]',
    wanted: (words) => accumulated(words, Number(accumulatorBits), rate, 500),
  })),
  {
    title: 'two-accumulators, 64 × 12 in two’s complement',
    definition: signed,
    options: { playback: 'two-accumulators' },
    next: 'NAME_next()',
    wanted: (words) =>
      summed(
        words.map((word) => word + 2048),
        24,
        rate,
        second,
        500,
      ).map((code) => code - 2048),
  },
  {
    title: 'two-accumulators, 1024 × 16',
    definition: tone({ length: 1024, bits: 16 }),
    options: { playback: 'two-accumulators' },
    next: 'NAME_next()',
    wanted: (words) => summed(words, 24, rate, second, 500),
  },
  {
    ...tableCases.packed12,
    title: `timer, ${tableCases.packed12.title}`,
    options: { playback: 'timer', packed: 'yes' },
    next: 'NAME_word(NAME_next_entry())',
    wanted: (words) => [...words, ...words],
  },
  {
    ...tableCases.mapped,
    title: `timer, ${tableCases.mapped.title}`,
    options: { playback: 'timer', ...tableCases.mapped.options },
    next: '(e = NAME_next_entry(), NAME_b[e] + 256l * NAME_d[e])',
    wanted: (words) => [...words, ...words],
  },
  {
    ...tableCases.mappedFold,
    title: `timer-accumulator of 24 bits, ${tableCases.mappedFold.title}`,
    options: { playback: 'timer-accumulator', ...tableCases.mappedFold.options },
    next: '(e = NAME_next_entry(), NAME_b_word(e) + 256l * NAME_d_word(e))',
    wanted: (words) => accumulated(words, 24, rate, 500),
  },
  {
    title: 'once, 64 × 12 in two’s complement',
    definition: signed,
    options: { playback: 'once', rampWords: '5', idleCode: '1000' },
    next: 'NAME[NAME_next_entry()]',
    wanted: (words) => {
      const all = playedOnce(words, 1000 - 2048, 5);
      return [...all, ...Array.from({ length: 9 }, () => 1000 - 2048)];
    },
  },
];

/** c99: what its functions give word by word, what the step word's macro gives, and what it refuses to compile. */
export async function proveC99Playback(): Promise<Proof[]> {
  const tool = 'gcc, clang';
  const playing = kinds.map((kind, k) => {
    const name = `play_${k}`;
    const { table, files } = exported(kind.definition, 'c99', { arrayName: name, ...kind.options });
    const [{ words: first }, other] = expectedOf(table, kind.places);
    const words = first.map((word, entry) => word + 256 * (other?.words[entry] ?? 0));
    return { ...kind, name, files, wanted: kind.wanted(words) };
  });
  const dma = exported(signed, 'c99', {
    arrayName: 'channel',
    playback: 'dma',
    dmaBits: '32',
    alignment: '4',
  });
  const tones = Array.from({ length: 40 }, (_, k) => (k * 207_017 + 1) % 8_000_000);
  const main = `
#include <stdio.h>
#include "channel.h"
${playing.map(({ name }) => `#include "${name}_play.h"`).join('\n')}
int main(void)
{
    unsigned int k;
    uint16_t e;
${playing
  .map(
    ({ name, next, wanted }) => `    ${name}_start();
    for (k = 0u; k < ${wanted.length}u; ++k) { printf("%ld ", (long)${next.replaceAll('NAME', name)}); }
    printf("\\n");`,
  )
  .join('\n')}
    for (k = 0u; k < CHANNEL_DMA_ITEMS; ++k) { printf("%ld ", (long)channel[k]); }
    printf("\\n%u\\n", CHANNEL_DMA_ITEM_BYTES * (unsigned int)((sizeof channel / sizeof channel[0]) / CHANNEL_DMA_ITEMS));
${tones.map((m) => `    printf("%lu ", (unsigned long)PLAY_6_STEP_FOR_MILLIHZ(${m}u));`).join('\n')}
    return 0;
}
`;
  const beyond =
    '#include "play_6_play.h"\nuint32_t step(void);\nuint32_t step(void) { return PLAY_6_STEP_FOR_MILLIHZ(8000001u); }\n';
  const files = [
    ...playing.flatMap((one) => one.files),
    ...dma.files,
    { name: 'main.c', text: main },
    { name: 'beyond.c', text: beyond },
    { name: 'within.c', text: beyond.replace('8000001', '8000000') },
  ];
  await inFolder(files, async (folder) => {
    const sources = files
      .map(({ name }) => name)
      .filter((name) => name.endsWith('.c') && !/beyond|within/.test(name));
    for (const compiler of ['gcc', 'clang']) {
      await run(compiler, ['-std=c99', ...everyWarning, ...sources, '-o', 'main'], folder);
      const lines = (await run('./main', [], folder))
        .split('\n')
        .map((line) => line.trim().split(' ').map(Number));
      playing.forEach(({ title, wanted }, k) => mustEqual(lines[k], wanted, `c99 ${title}`));
      const patterns = expectedOf(dma.table)[0].words.map((word) => word & 0xfff);
      mustEqual(lines[playing.length], patterns, 'c99 dma');
      mustEqual(lines[playing.length + 1], [4], 'c99 dma item bytes');
      const steps = tones.map((m) =>
        Number((BigInt(m) * 2n ** 32n * 500n * 2n + 8_000_000_000n) / 16_000_000_000n),
      );
      mustEqual(lines[playing.length + 2], steps, 'step words');
      await run(compiler, ['-std=c99', ...strictWarnings, '-c', 'within.c'], folder);
      const isTaken = await run(compiler, ['-std=c99', ...strictWarnings, '-c', 'beyond.c'], folder).then(
        () => true,
        () => false,
      );
      if (isTaken) throw new Error(`${compiler} takes a tone above half the sample rate.`);
    }
  });
  return [
    ...playing.map(({ title }) => ({ case: title, tool, proven: 'every word in order' })),
    { case: 'dma, 64 × 12 in elements of 32 bits', tool, proven: 'every element, without a sign' },
    { case: 'step words', tool, proven: 'nearest word for 40 tones; a tone too high does not compile' },
  ];
}
