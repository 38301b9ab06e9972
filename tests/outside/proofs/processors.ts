import { spawn } from 'node:child_process';
import { readFile, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { setTimeout } from 'node:timers/promises';
import { strictWarnings } from '../support/compilers.ts';
import { inFolder, run } from '../support/programs.ts';
import { exported, tone } from '../support/tables.ts';
import { everyWarning, printer } from './c-programs.ts';
import { exportCases, expectedOf, mustEqual, mustPrint, type Exported } from './cases.ts';
import { accumulated, playedOnce, summed } from './played.ts';
import { each, type Proof } from './proof.ts';

/** A processor, its compiler and the simulated machine that its programs run on. */
interface Processor {
  readonly target: 'cortex-m' | 'riscv';
  readonly tools: string;
  readonly flags: readonly string[];
  /** Start-up code: calls main, then ends the simulation; `put(byte)` sends a byte out. */
  readonly startUp: string;
  readonly linkerScript: string;
  readonly emulator: readonly string[];
  /** Where a byte written is sent out by the simulated serial port. */
  readonly serialAddress: string;
  readonly handler: string;
}

const flat = (origin: string, ram: string) => `
MEMORY { code : ORIGIN = ${origin}, LENGTH = 4M  ram : ORIGIN = ${ram}, LENGTH = 1M }
ENTRY(start)
SECTIONS {
  .text : { KEEP(*(.vectors)) *(.text*) *(.rodata*) . = ALIGN(8); } > code
  .data : { *(.data*) *(.sdata*) } > ram AT > ram
  .bss : { *(.bss*) *(.sbss*) *(COMMON) } > ram
}
`;

// Cortex-M3 of QEMU's board mps2-an385: memory from 0, RAM from 0x20000000, UART 0 at 0x40004000 (QEMU's
// documentation, "Arm MPS2 and MPS3 boards"); the end by semihosting's SYS_EXIT (Semihosting for AArch32 and AArch64).
const cortexM: Processor = {
  target: 'cortex-m',
  tools: 'arm-none-eabi-',
  flags: ['-mcpu=cortex-m3', '-mthumb'],
  startUp: `
#include <stdint.h>
int main(void);
void put(char byte);
void start(void);
void trap(void);
void SysTick_Handler(void) __attribute__((weak));
void put(char byte) { *(volatile uint32_t *)0x40004000u = (uint32_t)byte; }
static void end(uint32_t reason) {
    register uint32_t r0 __asm__("r0") = 0x18u;
    register uint32_t r1 __asm__("r1") = reason;
    __asm__ volatile("bkpt 0xAB" : : "r"(r0), "r"(r1) : "memory");
}
void trap(void) { end(0x20023u); }
void start(void) {
    *(volatile uint32_t *)0x40004010u = 16u;
    *(volatile uint32_t *)0x40004008u = 1u;
    (void)main();
    end(0x20026u);
}
__attribute__((section(".vectors"), used)) void (*const vectors[16])(void) = {
    (void (*)(void))0x20080000u, start, trap, trap, trap, trap, trap, 0, 0, 0, 0, trap, trap, 0, trap, SysTick_Handler,
};
`,
  linkerScript: flat('0', '0x20000000'),
  emulator: ['qemu-system-arm', '-M', 'mps2-an385', '-semihosting-config', 'enable=on,target=native'],
  serialAddress: '0x40004000',
  handler: 'SysTick_Handler',
};

// QEMU's board virt: RAM from 0x80000000, a 16550 at 0x10000000, the test device at 0x100000, the machine timer where
// the target's defaults have it (QEMU's documentation, "'virt' Generic Virtual Platform").
const riscv: Processor = {
  target: 'riscv',
  tools: 'riscv64-unknown-elf-',
  flags: ['-march=rv32imac_zicsr', '-mabi=ilp32', '-mcmodel=medany'],
  startUp: `
#include <stdint.h>
int main(void);
void put(char byte);
void run(void);
void put(char byte) { *(volatile uint8_t *)0x10000000u = (uint8_t)byte; }
__attribute__((section(".vectors"), used, naked)) void start(void) {
    __asm__ volatile("la sp, 0x80780000\\n\\tcall run");
}
void run(void) {
    (void)main();
    *(volatile uint32_t *)0x100000u = 0x5555u;
    for (;;) { }
}
`,
  linkerScript: flat('0x80000000', '0x80600000'),
  emulator: ['qemu-system-riscv32', '-M', 'virt', '-bios', 'none'],
  serialAddress: '0x10000000',
  handler: 'wave_on_timer',
};

const compilerFlags = ({ flags }: Processor) => [
  '-std=c99',
  '-O2',
  '-ffreestanding',
  '-nostdlib',
  '-nostartfiles',
  '-T',
  'flat.ld',
  ...flags,
];

/** Compiles with every warning an error, then runs; gives what the serial port sent, as bytes. */
async function simulate(
  processor: Processor,
  files: readonly { readonly name: string; readonly text: string }[],
  main: string,
  wantedBytes?: number,
): Promise<{ sent: Buffer; disassembly: string }> {
  const all = [
    ...files,
    { name: 'main.c', text: main },
    { name: 'start.c', text: processor.startUp },
    { name: 'flat.ld', text: processor.linkerScript },
  ];
  const own = files.map(({ name }) => name).filter((name) => name.endsWith('.c'));
  return inFolder(all, async (folder) => {
    const gcc = `${processor.tools}gcc`;
    const flags = compilerFlags(processor);
    // The files of the export under every warning; what only carries them need not please.
    await run(gcc, [...flags.slice(0, 3), ...processor.flags, ...everyWarning, '-c', ...own], folder);
    const objects = own.map((name) => name.replace(/c$/, 'o'));
    await run(
      gcc,
      [
        ...flags,
        ...strictWarnings.slice(0, 1),
        'start.c',
        'main.c',
        ...objects,
        '-lgcc',
        '-o',
        'program.elf',
      ],
      folder,
    );
    const disassembly = await run(
      `${processor.tools}objdump`,
      ['-d', '--no-show-raw-insn', 'program.elf'],
      folder,
    );
    return { sent: await serialOutput(processor, folder, wantedBytes), disassembly };
  });
}

/**
 * Runs until the program ends, or until it has sent so many bytes; half a minute at most. They go into a file: into a
 * pipe the simulated port could send only as fast as someone reads.
 */
async function serialOutput(
  { emulator }: Processor,
  folder: string,
  wantedBytes = Infinity,
): Promise<Buffer> {
  const [command, ...args] = emulator;
  const sent = join(folder, 'sent.bin');
  const board = ['-display', 'none', '-monitor', 'none', '-serial', `file:${sent}`];
  const child = spawn(command, [...args, ...board, '-kernel', join(folder, 'program.elf')]);
  let said = '';
  child.stderr.setEncoding('utf8').on('data', (text: string) => (said += text));
  const ended = new Promise<void>((resolve, reject) => {
    child.once('error', reject);
    child.once('close', () => resolve());
  });
  const sizeNow = () =>
    stat(sent).then(
      ({ size }) => size,
      () => 0,
    );
  const start = performance.now();
  let isRunning = true;
  void ended.finally(() => (isRunning = false)).catch(() => undefined);
  while (isRunning && (await sizeNow()) < wantedBytes && performance.now() - start < 30_000) {
    await Promise.race([ended, setTimeout(10)]);
  }
  child.kill();
  await ended;
  const bytes = await readFile(sent).catch(() => Buffer.alloc(0));
  if (bytes.length === 0 || (wantedBytes !== Infinity && bytes.length < wantedBytes)) {
    throw new Error(`${command} sent ${bytes.length} bytes of ${wantedBytes}. ${said}`);
  }
  return bytes;
}

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
  const { sent } = await simulate(processor, files, bareMain(cases));
  mustPrint(sent.toString(), cases);
  const tool = `${processor.tools}gcc, ${processor.emulator[0]}`;
  return each(cases, tool, 'compiled without a warning; the running program reads every entry back');
}

const turns = 3;

async function provePlayback(processor: Processor): Promise<Proof[]> {
  const tool = `${processor.tools}gcc, ${processor.emulator[0]}`;
  const proofs: Proof[] = [];
  const prove = async (
    playback: string,
    length: number,
    wanted: (codes: number[]) => number[],
    options = {},
  ) => {
    const { table, files } = exported(tone({ length }), processor.target, {
      arrayName: 'wave',
      playback,
      portAddress: processor.serialAddress,
      countsPerWord: '4000',
      ...options,
    });
    const [{ words }] = expectedOf(table);
    const expected = wanted([...words]);
    const { sent, disassembly } = await simulate(
      processor,
      files,
      playback === 'loop' ? loopMain : handlerMain(processor),
      expected.length,
    );
    mustEqual([...sent.subarray(0, expected.length)], expected, `${processor.target} ${playback}`);
    proofs.push({
      case: `${playback}, ${length} × 8`,
      tool,
      proven: playback === 'loop' ? 'every word in order' : 'every word in order, from real interrupts',
      instructions:
        playback === 'loop'
          ? loopInstructions(disassembly)
          : functionInstructions(disassembly, processor.handler),
    });
  };
  const round = (words: number[]) => Array.from({ length: turns }, () => words).flat();
  await prove('loop', 256, round);
  await prove('loop', 100, round);
  await prove('timer', 256, round);
  await prove('timer', 100, round);
  const rate = { clockHz: 8_000_000, cyclesPerWord: 4000 };
  await prove('timer-accumulator', 256, (codes) =>
    accumulated(codes, 24, { ...rate, milliHz: 440_000 }, 400),
  );
  await prove('two-accumulators', 256, (codes) =>
    summed(codes, 24, { ...rate, milliHz: 440_000 }, { ...rate, milliHz: 550_000 }, 400),
  );
  await prove('once', 100, (codes) => playedOnce(codes, 128, 9), { rampWords: '9', idleCode: '128' });
  return proofs;
}

const loopMain = `#include "wave_play.h"
int main(void) { wave_play(); return 0; }
`;

const handlerMain = ({ target }: Processor) => `#include "wave_play.h"
int main(void) {
    ${target === 'riscv' ? '__asm__ volatile("csrw mtvec, %0" : : "r"(wave_on_timer));' : ''}
    wave_start();
    ${target === 'riscv' ? '__asm__ volatile("csrsi mstatus, 8");' : ''}
    for (;;) { }
}
`;

const instructionLine = /^\s*([0-9a-f]+):\s+(\S+)\s*(.*)$/gm;

function instructionsOf(disassembly: string, name: string) {
  const start = disassembly.indexOf(`<${name}>:`);
  const body = disassembly.slice(start).split(/\n\s*\n/)[0];
  return [...body.matchAll(instructionLine)]
    .map(([, address, mnemonic, operands]) => ({ address: parseInt(address, 16), mnemonic, operands }))
    .filter(({ mnemonic }) => !mnemonic.startsWith('.'));
}

/** All instructions of a handler: at least as many as any way through it, which has no loop. */
function functionInstructions(disassembly: string, name: string): number {
  const all = instructionsOf(disassembly, name);
  const calls = all.filter(({ mnemonic }) => /^(bl|jal|call)$/.test(mnemonic));
  const called = calls.map(({ operands }) => /<([^>+]+)>/.exec(operands)?.[1] ?? '');
  return all.length + called.reduce((sum, one) => sum + functionInstructions(disassembly, one), 0);
}

/** Instructions from the target of the jump back to that jump. */
function loopInstructions(disassembly: string): number {
  const all = instructionsOf(disassembly, 'wave_play');
  const backs = all.flatMap(({ address, operands }, at) => {
    const [target] = /\b[0-9a-f]+\b(?=\s+<wave_play)/.exec(operands) ?? [];
    const from = target === undefined ? -1 : all.findIndex((one) => one.address === parseInt(target, 16));
    return from >= 0 && all[from].address <= address ? [at - from + 1] : [];
  });
  return Math.max(...backs);
}

const prove = async (processor: Processor) => [
  ...(await proveTables(processor)),
  ...(await provePlayback(processor)),
];
export const proveCortexM = () => prove(cortexM);
export const proveRiscv = () => prove(riscv);
