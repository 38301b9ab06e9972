import type { DefinitionInput } from '../../../shared/contract/index.ts';
import { simulate, timerOf, type SimulatedRun } from '../support/avr-simulator.ts';
import { avrPart, avrProgram } from '../support/compilers.ts';
import { exported, tone } from '../support/tables.ts';
import { everyWarning } from './c-programs.ts';
import { exportCases, expectedOf, mustEqual, tableCases } from './cases.ts';
import { accumulated, playedOnce, summed } from './played.ts';
import type { Proof } from './proof.ts';

// Compiler and addresses: avr-gcc and avr-libc. Judge of what runs: the instruction-level simulator avr8js. It charges
// 2 cycles for the response to an interrupt, the data sheets of these parts 4.

const mcu = 'attiny4313';
const tool = 'avr-gcc, avr8js';
const strict = ['-std=c99', '-Os', ...everyWarning];

/** A part of 32 KiB: its vectors are jumps of two words, one cycle longer. */
const largeMcu = 'atmega328p';

const partAndTimer = async (name = mcu) => ({
  mcu: name,
  part: await avrPart(name, ['B', 'D']),
  timer: await timerOf(name, name === largeMcu),
});
type Bench = Awaited<ReturnType<typeof partAndTimer>>;

const valuesAt = ({ writes }: SimulatedRun, register: string) =>
  writes.filter((write) => write.register === register).map(({ value }) => value);

/** Cycles between the writes of each port, and whether they are all alike. */
function stepsOf({ writes }: SimulatedRun): Set<number> {
  const steps = new Set<number>();
  for (const port of ['PORTB', 'PORTD']) {
    const cycles = writes.filter(({ register }) => register === port).map(({ cycle }) => cycle);
    cycles.slice(1).forEach((cycle, k) => steps.add(cycle - cycles[k]));
  }
  return steps;
}

/** What each port has to show of a word, without a map: eight bits each. */
const bytesOf = (words: readonly number[], bits: number) => [
  { port: 'PORTB', values: words.map((word) => word & (2 ** Math.min(bits, 8) - 1)) },
  ...(bits > 8 ? [{ port: 'PORTD', values: words.map((word) => (word >> 8) & (2 ** (bits - 8) - 1)) }] : []),
];

interface Playing {
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

const loops: Playing[] = [
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
const loopRate = (cyclesPerWord: number) => ({ clockHz, cyclesPerWord, milliHz: 2_000_123 });
const accumulators = [
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

const timerRate = { clockHz, cyclesPerWord: 500, milliHz: 440_000 };
const secondRate = { ...timerRate, milliHz: 550_000 };
const onTimer: (Playing & { playback: string })[] = [
  { playback: 'timer', title: '256 × 8', definition: tone({}), options: {}, played: thrice },
  { playback: 'timer', title: '100 × 8', definition: tone({ length: 100 }), options: {}, played: thrice },
  {
    playback: 'timer',
    title: '300 × 12 on two ports',
    definition: tone({ length: 300, bits: 12 }),
    options: {},
    played: thrice,
  },
  {
    playback: 'timer',
    ...mapped,
    title: `${mapped.title} and kept`,
    options: { ...mapped.options, reservedBy: 'kept' },
    played: thrice,
  },
  {
    playback: 'timer-accumulator',
    title: '256 × 8',
    definition: tone({}),
    options: {},
    played: (words) => accumulated(words, 24, timerRate, 400),
  },
  {
    playback: 'timer-accumulator',
    title: '512 × 10 in two’s complement, 32 bits',
    definition: tone({ length: 512, bits: 10, coding: 'twos-complement' }),
    options: { accumulatorBits: '32' },
    played: (words) => accumulated(words, 32, timerRate, 400),
  },
  {
    playback: 'two-accumulators',
    title: '256 × 8',
    definition: tone({}),
    options: {},
    played: (words) => summed(words, 24, timerRate, secondRate, 400),
  },
  {
    playback: 'two-accumulators',
    title: '128 × 12 in two’s complement',
    definition: tone({ length: 128, bits: 12, coding: 'twos-complement' }),
    options: {},
    played: (words) =>
      summed(
        words.map((word) => word + 2048),
        24,
        timerRate,
        secondRate,
        300,
      ).map((code) => code - 2048),
  },
  {
    playback: 'once',
    title: '100 × 8',
    definition: tone({ length: 100 }),
    options: { rampWords: '9', idleCode: '30' },
    played: (words) => playedOnce(words, 30, 9),
  },
];

async function play({ definition, options, places, played }: Playing, bench: Bench, playback: string) {
  const { table, files } = exported(definition, 'avr', { arrayName: 'wave', playback, ...options });
  const program = await avrProgram(files, bench.mcu, strict);
  const bits = table.definition.table.bits;
  const isKept = options.reservedBy === 'kept';
  const rounds = expectedOf(table, places);
  // Kept pins show 0, which is what the simulated port has at reset.
  const shown =
    places === undefined
      ? bytesOf(played([...rounds[0].words]), bits)
      : rounds.map(({ port, words }) => ({
          port: `PORT${port.toUpperCase()}`,
          values: played(words.map((word) => (isKept && port === 'b' ? word - 4 : word))),
        }));
  const isOnce = playback === 'once';
  // The idle word comes first, before the pins are outputs.
  const wantedPortWrites = shown.length * (shown[0].values.length + (isOnce ? 1 : 0));
  const run = simulate(program, bench.part, { wantedPortWrites, timer: bench.timer });
  for (const { port, values } of shown) {
    const found = valuesAt(run, port);
    mustEqual(isOnce ? found.slice(1) : found, values, `avr ${playback} ${port}`);
  }
  const said = Number(/each (\d+)\s+cycles/.exec(files[2].text.replaceAll('\n *', ''))?.[1]);
  const most = Number(/takes at most (\d+) cycles/.exec(files[2].text)?.[1]);
  return { run, said, most };
}

/** Each kind of playback from reset on: what the ports show, and when. */
export async function proveAvr(): Promise<Proof[]> {
  const bench = await partAndTimer();
  const proofs: Proof[] = [...(await proveReaders(bench))];
  for (const one of loops) {
    const { run, said } = await play(one, bench, 'loop');
    proofs.push(evenly('loop', one.title, run, said));
  }
  for (const { title, definition, bits, cyclesPerWord } of accumulators) {
    const rate = loopRate(cyclesPerWord);
    const options = { accumulatorBits: String(bits), toneMilliHz: String(rate.milliHz) };
    // The first word comes after the first step.
    const played = (words: number[]) => accumulated(words, bits, rate, 601).slice(1);
    const { run, said } = await play({ title, definition, options, played }, bench, 'accumulator');
    if (said !== cyclesPerWord) throw new Error(`${title}: ${said} cycles for ${cyclesPerWord}.`);
    proofs.push(evenly('accumulator', title, run, said));
  }
  const large = await partAndTimer(largeMcu);
  const onLarge = onTimer.slice(0, 1).map((one) => ({ ...one, title: `${one.title}, vectors of two words` }));
  for (const one of [...onTimer, ...onLarge]) {
    const isLarge = onLarge.includes(one);
    const { run, most } = await play(one, isLarge ? large : bench, one.playback);
    const delays = new Set(run.writeDelays);
    const [delay] = delays;
    if (delays.size !== 1)
      throw new Error(`${one.title}: writes come ${[...delays].join()} cycles after the response.`);
    const handlerCycles = Math.max(...run.handlerCycles);
    // The file counts a vector of rjmp.
    if (handlerCycles + 2 - Number(isLarge) !== most)
      throw new Error(`${one.title}: ${handlerCycles} cycles, where the file says ${most}.`);
    proofs.push({
      case: `${one.playback}, ${one.title}`,
      tool,
      proven: `every word in order; the write ${delay} cycles after the response, always`,
      cyclesPerWord: 500,
      handlerCycles,
    });
  }
  return proofs;
}

function evenly(playback: string, title: string, run: SimulatedRun, said: number): Proof {
  const steps = stepsOf(run);
  if (steps.size !== 1 || !steps.has(said)) {
    throw new Error(
      `${playback}, ${title}: ${[...steps].join()} cycles between writes, where the file says ${said}.`,
    );
  }
  return {
    case: `${playback}, ${title}`,
    tool,
    proven: 'every word in order, all intervals alike',
    cyclesPerWord: said,
  };
}

/** Tables without playback: a program reads each entry through the header and shows it on the ports. */
async function proveReaders({ part }: Bench): Promise<Proof[]> {
  const proofs: Proof[] = [];
  for (const { title, name, files, expected } of exportCases('avr', { playback: 'none' })) {
    const header = files[0].text;
    const read = header.includes(`${name}_word(`)
      ? `${name}_word(k)`
      : `pgm_read_${header.includes('uint16_t') || header.includes('int16_t') ? 'word' : 'byte'}(&${name}[k])`;
    const main = `#include <avr/io.h>
#include "${name}.h"
int main(void)
{
    for (uint16_t k = 0u; k < ${expected[0].words.length}u; ++k) {
        const uint16_t word = (uint16_t)${read};
        PORTB = (uint8_t)word;
        PORTD = (uint8_t)(word >> 8);
    }
    for (;;) { }
}
`;
    const program = await avrProgram([...files, { name: 'main.c', text: main }], mcu, strict);
    const words = expected[0].words.map((word, k) => (word & 0xffff) | ((expected[1]?.words[k] ?? 0) << 8));
    const run = simulate(program, part, { wantedPortWrites: 2 * words.length });
    const [low, high] = [valuesAt(run, 'PORTB'), valuesAt(run, 'PORTD')];
    mustEqual(
      low.map((byte, k) => byte | (high[k] << 8)),
      words,
      `avr ${title}`,
    );
    proofs.push({ case: title, tool, proven: 'the running program reads every entry back' });
  }
  return proofs;
}
