import { readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { inFolder, run } from './programs.ts';

interface SourceFile {
  readonly name: string;
  readonly text: string;
}

/** All that GCC warns of for ISO C, as errors (GCC manual, "Options to Request or Suppress Warnings"). */
export const strictWarnings = ['-Wall', '-Wextra', '-Wpedantic', '-Werror'] as const;

/** Prints what the header says (entries, entries by the compiler's count, least, most), then each word, a line each. */
const printer = (arrayName: string) => {
  const macro = arrayName.toUpperCase();
  return `
#include <stdio.h>
#include "${arrayName}.h"

int main(void)
{
    unsigned long i;
    printf("%ld\\n", (long)${macro}_LENGTH);
    printf("%ld\\n", (long)(sizeof ${arrayName} / sizeof ${arrayName}[0]));
    printf("%ld\\n%ld\\n", (long)${macro}_MIN_WORD, (long)${macro}_MAX_WORD);
    for (i = 0; i < ${macro}_LENGTH; ++i) printf("%ld\\n", (long)${arrayName}[i]);
    return 0;
}
`;
};

/** The words of such a print-out. @throws where the header's macros say something else than its array */
function wordsIn(text: string): number[] {
  const [length, counted, least, most, ...words] = numbersIn(text);
  const found = [
    words.length,
    words.length,
    words.reduce((a, b) => Math.min(a, b)),
    words.reduce((a, b) => Math.max(a, b)),
  ];
  const said = [length, counted, least, most];
  if (said.join() !== found.join())
    throw new Error(`The header says ${said.join()}, the array ${found.join()}.`);
  return words;
}

/** Compiles an export in C beside a program that prints its array, runs that, and gives the numbers. */
export function numbersInC(
  files: readonly SourceFile[],
  arrayName: string,
  flags: readonly string[],
): Promise<number[]> {
  const sources = [`${arrayName}.c`, 'print.c'];
  return inFolder([...files, { name: 'print.c', text: printer(arrayName) }], async (folder) => {
    await run('gcc', [...flags, ...sources, '-o', 'print'], folder);
    return wordsIn(await run('./print', [], folder));
  });
}

/** The same with the array compiled as C and the program that includes the header as C++. */
export function numbersInCpp(
  files: readonly SourceFile[],
  arrayName: string,
  flags: readonly string[],
): Promise<number[]> {
  return inFolder([...files, { name: 'print.cpp', text: printer(arrayName) }], async (folder) => {
    await run('gcc', ['-std=c99', ...strictWarnings, '-c', `${arrayName}.c`, '-o', 'array.o'], folder);
    await run('g++', [...flags, 'print.cpp', 'array.o', '-o', 'print'], folder);
    return wordsIn(await run('./print', [], folder));
  });
}

const numbersIn = (text: string) => text.trim().split('\n').map(Number);

/** Compiles and links an export for an AVR part; gives the program memory's bytes. */
export function avrProgram(
  files: readonly SourceFile[],
  mcu: string,
  flags: readonly string[] = ['-Os', '-Wall', '-Werror'],
): Promise<Uint8Array> {
  return inFolder(files, async (folder) => {
    const sources = files.map(({ name }) => name).filter((name) => name.endsWith('.c'));
    await run('avr-gcc', [...flags, `-mmcu=${mcu}`, ...sources, '-o', 'program.elf'], folder);
    await run(
      'avr-objcopy',
      ['-O', 'binary', '-j', '.text', '-j', '.data', 'program.elf', 'program.bin'],
      folder,
    );
    return readFile(join(folder, 'program.bin'));
  });
}

export interface PortAddresses {
  /** Address of the data register in data space. */
  readonly port: number;
  /** Address of the direction register in data space. */
  readonly ddr: number;
}

export interface AvrPart {
  readonly ports: Readonly<Record<string, PortAddresses>>;
  /** Highest address of its static memory. */
  readonly ramEnd: number;
  /** Highest address of its program memory, in bytes. */
  readonly flashEnd: number;
}

/** Addresses of a part as avr-libc's header for it has them. */
export async function avrPart(mcu: string, ports: readonly string[]): Promise<AvrPart> {
  const names = ports.flatMap((port) => [`PORT${port}`, `DDR${port}`]);
  const values = await avrValues(mcu, ['RAMEND', 'FLASHEND', ...names]);
  return {
    ramEnd: values.RAMEND,
    flashEnd: values.FLASHEND,
    ports: Object.fromEntries(
      ports.map((port) => [port, { port: values[`PORT${port}`], ddr: values[`DDR${port}`] }]),
    ),
  };
}

/** Values of macros of avr-libc's header for a part: preprocessor and compiler work them out, nobody copies. */
export function avrValues(mcu: string, names: readonly string[]): Promise<Record<string, number>> {
  const marked = names.map((name) => `stepwell_wants ${name}`);
  // With this, as sfr_defs.h says, register names are plain constants: their addresses in data space.
  const probe = [
    '#define _SFR_ASM_COMPAT 1',
    '#define __SFR_OFFSET 0x20',
    '#include <avr/io.h>',
    ...marked,
    '',
  ].join('\n');
  return inFolder([{ name: 'probe.c', text: probe }], async (folder) => {
    const seen = await run('avr-gcc', ['-E', '-P', `-mmcu=${mcu}`, 'probe.c'], folder);
    const lines = [...seen.matchAll(/^stepwell_wants (.+)$/gm)].map(
      ([, value]) => `printf("%ld\\n", (long)(${value}));`,
    );
    await writeFile(
      join(folder, 'values.c'),
      `#include <stdio.h>\nint main(void) { ${lines.join(' ')} return 0; }\n`,
    );
    await run('gcc', ['values.c', '-o', 'values'], folder);
    const values = numbersIn(await run('./values', [], folder));
    return Object.fromEntries(names.map((name, index) => [name, values[index]]));
  });
}
