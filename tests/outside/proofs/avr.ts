import { simulate, timerOf, type SimulatedRun } from '../support/avr-simulator.ts';
import { avrPart, avrProgram } from '../support/compilers.ts';
import { exported } from '../support/tables.ts';
import { accumulators, loopRate, loops, onTimer, type Playing } from './avr-cases.ts';
import { busyLoop, busyLoopCycles, mainLoopCycles, mustVary } from './avr-entry.ts';
import { everyWarning } from './c-programs.ts';
import { exportCases, expectedOf, mustEqual } from './cases.ts';
import { accumulated } from './played.ts';
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

/** @param inMain what the main program does in the place of its empty loop */
async function play(
  { definition, options, places, played }: Playing,
  bench: Bench,
  playback: string,
  inMain?: (file: string) => string,
) {
  const { table, files } = exported(definition, 'avr', { arrayName: 'wave', playback, ...options });
  const sources = files.map((file) =>
    inMain !== undefined && file.name === 'wave_main.c' ? { ...file, text: inMain(file.text) } : file,
  );
  const program = await avrProgram(sources, bench.mcu, strict);
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
  return { run, said, most, main: files[2].text };
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
  for (const timed of [...onTimer, ...onLarge]) {
    const { playback, cyclesPerWord } = timed;
    const one = { ...timed, options: { ...timed.options, compare: String(cyclesPerWord - 1) } };
    const isLarge = onLarge.includes(timed);
    const part = isLarge ? large : bench;
    const { run, most, main } = await play(one, part, playback);
    const delays = new Set(run.writeDelays);
    const [delay] = delays;
    if (delays.size !== 1)
      throw new Error(`${one.title}: writes come ${[...delays].join()} cycles after the response.`);
    const handlerCycles = Math.max(...run.handlerCycles);
    // The file counts a vector of rjmp.
    if (handlerCycles + 2 - Number(isLarge) !== most)
      throw new Error(`${one.title}: ${handlerCycles} cycles, where the file says ${most}.`);
    const busy = await play(one, part, playback, busyLoop);
    const entry = mustVary(`${playback}, ${one.title}`, main, [
      { run, loopCycles: mainLoopCycles },
      { run: busy.run, loopCycles: busyLoopCycles(isLarge) },
    ]);
    proofs.push({
      case: `${playback}, ${one.title}`,
      tool,
      proven: `every word in order; the write ${delay} cycles after the response, always`,
      cyclesPerWord,
      handlerCycles,
      ...entry,
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
