import { exported } from '../support/tables.ts';
import { printer } from './c-programs.ts';
import { exportCases, expectedOf, mustPrint, portsOf, shownOn, type Exported } from './cases.ts';
import { functionInstructions, loopInstructions } from './disassembly.ts';
import { countsPerWord, playedCases, type PlayedCase } from './processor-cases.ts';
import { each, type Proof } from './proof.ts';
import { cortexM, riscv, type Processor, type SimulatedPort } from './simulated-boards.ts';
import { printedBy, tracedWrites, type TracedWrite } from './simulated-runs.ts';

/** Prints by put() in the place of printf. */
const bareMain = (cases: readonly Exported[]) => `
#include <stdint.h>
void put(char byte);
static void text(const char *from) { while (*from != '\\0') { put(*from++); } }
static void number(long value) {
    char digits[12];
    int n = 0;
    unsigned long left = value < 0 ? 0ul - (unsigned long)value : (unsigned long)value;
    put(' ');
    if (value < 0) { put('-'); }
    do { digits[n++] = (char)('0' + left % 10u); left /= 10u; } while (left != 0u);
    while (n > 0) { put(digits[--n]); }
}
${printer(cases)
  .replace('#include <stdio.h>', '')
  .replaceAll(/printf\(" %ld", (.*)\); \}/g, 'number($1); }')
  .replaceAll(/printf\(("[^"]*")\);/g, 'text($1);')}`;

async function proveTables(processor: Processor): Promise<Proof[]> {
  const cases = exportCases(processor.target);
  const files = cases.flatMap((one) => one.files);
  mustPrint(await printedBy(processor, files, bareMain(cases)), cases);
  return each(
    cases,
    toolsOf(processor),
    'compiled without a warning; the running program reads every entry back',
  );
}

const toolsOf = ({ tools, emulator }: Processor) => `${tools}gcc, ${emulator[0]}`;

/** A port of a case: where it is, how it is written to, and what it has to show. */
interface PlayedPort extends SimulatedPort {
  /** Name of the array behind the export's. */
  readonly suffix: string;
  /** Bytes of a write. */
  readonly bytes: number;
  readonly driven: number;
  readonly shown: (word: number) => number;
}

function portsFor(processor: Processor, { options, places, rest }: PlayedCase, bits: number): PlayedPort[] {
  const dmaBytes = options.dmaBits === undefined ? undefined : Number(options.dmaBits) / 8;
  const widths = { 1: processor.ports[0], 2: processor.port16, 4: processor.port32 };
  if (places === undefined) {
    const bytes = dmaBytes ?? (bits <= 8 ? 1 : 2);
    const span = 2 ** bits;
    const shown = (word: number) => (word < 0 ? word + span : word);
    return [{ ...widths[bytes as 1 | 2 | 4], suffix: '', bytes, driven: span - 1, shown }];
  }
  const names = portsOf(places);
  return names.map((name, k) => {
    const pins = [...places, ...options.reservedPins.split(/[= ]/)]
      .filter((place) => place.startsWith(`${name}.`))
      .map((place) => Number(place.slice(2)));
    const topPin = Math.max(...pins);
    const bytes = dmaBytes ?? (topPin < 8 ? 1 : topPin < 16 ? 2 : 4);
    return {
      ...(names.length > 1 ? processor.ports[k] : widths[bytes as 1 | 2 | 4]),
      suffix: `_${name.toLowerCase()}`,
      bytes,
      driven: shownOn(name, places, 2 ** bits - 1),
      shown: (word) => shownOn(name, places, word) + (rest?.[name] ?? 0),
    };
  });
}

const registerOf = ({ address, bytes }: PlayedPort) => `(*(volatile uint${8 * bytes}_t *)${address}u)`;

/** Plays; where pins are kept, another part of the program sets them, first all high, then the other way again and again. */
function mainOf(
  { playback, options }: PlayedCase,
  processor: Processor,
  ports: readonly PlayedPort[],
): string {
  const isKept = options.reservedBy === 'kept';
  const high = isKept ? ports.map((port) => `put('m'); ${registerOf(port)} = ${topOf(port)}u;`) : [];
  const turned = isKept
    ? ports.map((port) => {
        const register = registerOf(port);
        return `put('m'); ${register} = (uint${8 * port.bytes}_t)(${register} ^ ${topOf(port) - port.driven}u);`;
      })
    : [];
  const begin = `#include "wave${playback === 'dma' ? '' : '_play'}.h"
void put(char byte);
int main(void) {
    ${high.join('\n    ')}
`;
  if (playback === 'loop') return `${begin}    wave_play();\n    return 0;\n}\n`;
  if (playback === 'dma') {
    // As a channel does: so many items of so many bytes, one after the other from the array's address on.
    const moves = ports.map(
      (port) =>
        `${registerOf(port)} = *(const uint${8 * port.bytes}_t *)((const char *)wave${port.suffix} + item * WAVE_DMA_ITEM_BYTES);`,
    );
    return `${begin}    for (;;) {
        for (uint32_t item = 0u; item < WAVE_DMA_ITEMS; ++item) { ${moves.join(' ')} }
    }
}
`;
  }
  return `${begin}    ${processor.prepare}
    wave_start();
    ${processor.letIn}
    for (;;) {
        for (volatile uint32_t k = 0u; k < 2000u; ++k) { }
        ${processor.keepOut}
        ${turned.join('\n        ')}
        ${processor.letIn}
    }
}
`;
}

const topOf = ({ bytes }: PlayedPort) => 2 ** (8 * bytes) - 1;

async function provePlayed(processor: Processor, one: PlayedCase): Promise<Proof> {
  const { playback, title, definition, options, played } = one;
  const ports = portsFor(processor, one, definition.table?.bits ?? 8);
  const { table, files } = exported(definition, processor.target, {
    arrayName: 'wave',
    playback,
    portAddress: ports.map(({ address }) => address).join(' '),
    countsPerWord: String(countsPerWord),
    ...options,
  });
  const [{ words }] = expectedOf(table);
  const expected = played([...words]).flatMap((word) =>
    ports.map((port) => ({ port, value: port.shown(word) })),
  );
  const addresses = ports.map(tracedAddress);
  const { writes, disassembly } = await tracedWrites(processor, files, mainOf(one, processor, ports), {
    addresses: new Set(addresses),
    count: expected.length,
  });
  const isKept = options.reservedBy === 'kept';
  const where = `${processor.target} ${playback}, ${title}`;
  mustWrite(writes, expected, isKept, where);
  const changes = writes.filter(({ isMains }) => isMains).length;
  if (isKept && playback !== 'loop' && changes < 5 * ports.length) {
    throw new Error(`${where}: main has changed pins only ${changes} times.`);
  }
  const instructions =
    playback === 'loop'
      ? loopInstructions(disassembly, 'wave_play')
      : functionInstructions(disassembly, processor.handler);
  return {
    case: `${playback}, ${title}`,
    tool: toolsOf(processor),
    proven: provenOf(playback, isKept),
    ...(playback === 'dma' ? {} : { instructions }),
  };
}

function provenOf(playback: PlayedCase['playback'], isKept: boolean): string {
  if (playback === 'dma') return 'every element in order and whole, read in the width of a channel';
  const kept = isKept ? '; other pins stay as main sets them' : '';
  return `every write in order, its value and width${playback === 'loop' ? '' : ', from real interrupts'}${kept}`;
}

const tracedAddress = ({ address, tracedAs }: SimulatedPort) => tracedAs ?? Number(address);

/** Each write by its port, width and value; kept pins show what main has set last. @throws where one differs */
function mustWrite(
  writes: readonly TracedWrite[],
  expected: readonly { readonly port: PlayedPort; readonly value: number }[],
  isKept: boolean,
  where: string,
): void {
  const others = new Map<number, number>();
  let at = 0;
  for (const { address, value, bytes, isMains } of writes) {
    if (isMains) {
      others.set(address, value);
      continue;
    }
    const { port, value: driven } = expected[at];
    const kept = isKept ? withoutBits(others.get(address) ?? 0, port.driven) : 0;
    const wanted = [tracedAddress(port), port.bytes, driven + kept];
    if ([address, bytes, value].join() !== wanted.join()) {
      const [found, meant] = [[address, bytes, value], wanted].map((each) => each.join(' '));
      throw new Error(`${where}: write ${at}: address, bytes, value ${found} for ${meant}.`);
    }
    at += 1;
  }
  if (at !== expected.length) throw new Error(`${where}: ${at} writes for ${expected.length}.`);
}

/** A pattern of 32 bits with those of a mask cleared. */
const withoutBits = (pattern: number, mask: number) => (pattern & ~mask) >>> 0;

async function prove(processor: Processor): Promise<Proof[]> {
  const proofs = await proveTables(processor);
  for (const one of playedCases) proofs.push(await provePlayed(processor, one));
  return proofs;
}

export const proveCortexM = () => prove(cortexM);
export const proveRiscv = () => prove(riscv);
