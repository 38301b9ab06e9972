import { spawn, type ChildProcessWithoutNullStreams } from 'node:child_process';
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { strictWarnings } from '../support/compilers.ts';
import { inFolder, run } from '../support/programs.ts';
import { everyWarning } from './c-programs.ts';
import type { Processor } from './simulated-boards.ts';

interface SourceFile {
  readonly name: string;
  readonly text: string;
}

/** A write to a device, as the simulator's trace has it: not what the program says of itself. */
export interface TracedWrite {
  readonly address: number;
  readonly value: number;
  /** Bytes of the access. */
  readonly bytes: number;
  /** Whether the main program made it: it writes to the serial port just before. */
  readonly isMains: boolean;
}

const longestMs = 30_000;

/** Compiles the files of an export with every warning an error, links them with a main, and works with the program. */
async function withProgram<Result>(
  { tools, flags: own, startUp, linkerScript }: Processor,
  files: readonly SourceFile[],
  main: string,
  work: (folder: string) => Promise<Result>,
): Promise<Result> {
  const carriers = [
    { name: 'main.c', text: main },
    { name: 'start.c', text: startUp },
    { name: 'flat.ld', text: linkerScript },
  ];
  const sources = files.map(({ name }) => name).filter((name) => name.endsWith('.c'));
  const flags = ['-std=c99', '-O2', '-ffreestanding', ...own];
  return inFolder([...files, ...carriers], async (folder) => {
    // The files of the export under every warning; what only carries them need not please.
    await run(`${tools}gcc`, [...flags, ...everyWarning, '-c', ...sources], folder);
    const objects = sources.map((name) => name.replace(/c$/, 'o'));
    const linking = ['-nostdlib', '-nostartfiles', '-T', 'flat.ld', ...strictWarnings.slice(0, 1)];
    const linked = ['start.c', 'main.c', ...objects, '-lgcc', '-o', 'program.elf'];
    await run(`${tools}gcc`, [...flags, ...linking, ...linked], folder);
    return work(folder);
  });
}

function startIn(folder: string, { emulator: [command, ...args] }: Processor, more: readonly string[]) {
  const rest = ['-display', 'none', '-monitor', 'none', '-kernel', 'program.elf', ...more];
  return spawn(command, [...args, ...rest], { cwd: folder });
}

/** Waits for the end of a simulation, which comes by force after half a minute. @throws where it cannot start */
async function ended(child: ChildProcessWithoutNullStreams): Promise<void> {
  const timer = setTimeout(() => child.kill(), longestMs);
  try {
    await new Promise<void>((resolve, reject) => {
      child.once('error', reject);
      child.once('close', () => resolve());
    });
  } finally {
    clearTimeout(timer);
  }
}

/** Runs a program to its end; gives what its serial port sent. */
export function printedBy(processor: Processor, files: readonly SourceFile[], main: string): Promise<string> {
  return withProgram(processor, files, main, async (folder) => {
    // Into a file: into a pipe the simulated port could send only as fast as someone reads.
    const sent = join(folder, 'sent.txt');
    const child = startIn(folder, processor, ['-serial', `file:${sent}`]);
    let said = '';
    child.stderr.setEncoding('utf8').on('data', (text: string) => (said += text));
    await ended(child);
    const text = await readFile(sent, 'utf8').catch(() => '');
    if (text === '') throw new Error(`${processor.emulator[0]} sent nothing. ${said}`);
    return text;
  });
}

// The simulated time goes by instructions, 2^6 ns each, and does not wait for the real one.
const tracing = ['-serial', 'null', '-icount', 'shift=6,sleep=off', '-trace', 'memory_region_ops_write'];
const writeLine = /^memory_region_ops_write .* addr (\w+) value (\w+) size (\d) /;

/**
 * Runs a program until it has written so many times to the addresses, what its main wrote not counted; gives these
 * writes, main's among them, and the disassembly.
 */
export function tracedWrites(
  processor: Processor,
  files: readonly SourceFile[],
  main: string,
  { addresses, count }: { readonly addresses: ReadonlySet<number>; readonly count: number },
): Promise<{ writes: TracedWrite[]; disassembly: string }> {
  const marker = Number(processor.serialAddress);
  return withProgram(processor, files, main, async (folder) => {
    const child = startIn(folder, processor, tracing);
    const writes: TracedWrite[] = [];
    const others: string[] = [];
    let isMains = false;
    let left = count;
    createInterface({ input: child.stderr }).on('line', (line) => {
      const [, place, value, size] = writeLine.exec(line) ?? [];
      if (place === undefined) others.push(line);
      const address = Number(place);
      if (addresses.has(address) && left > 0) {
        writes.push({ address, value: Number(value), bytes: Number(size), isMains });
        left -= Number(!isMains);
      }
      isMains = address === marker;
      if (left === 0) child.kill('SIGKILL');
    });
    await ended(child);
    if (left > 0) {
      const said = others.join('\n');
      throw new Error(`${processor.emulator[0]}: ${count - left} of ${count} writes. ${said}`);
    }
    const disassembly = await run(
      `${processor.tools}objdump`,
      ['-d', '--no-show-raw-insn', 'program.elf'],
      folder,
    );
    return { writes, disassembly };
  });
}
