import { avrInstruction, CPU } from 'avr8js';
import type { AvrPart } from './compilers.ts';

/** One write to an I/O register, in the order they happened. */
export interface RegisterWrite {
  /** `PORTB`, `DDRD`. */
  readonly register: string;
  readonly value: number;
  /** Clock cycles since reset when the instruction began. */
  readonly cycle: number;
}

/** I/O registers begin behind the 32 general ones; avr8js keeps 256 bytes for both, RAM's first bytes included. */
const registerSpace = 0x100;

/**
 * Runs a program instruction by instruction (package avr8js) from reset until its ports were written so many times.
 *
 * @throws where the program does not fit the part, or writes too little within `cycleLimit` cycles
 */
export function portWrites(
  program: Uint8Array,
  part: AvrPart,
  wantedPortWrites: number,
  cycleLimit = 10_000_000,
): RegisterWrite[] {
  if (program.length > part.flashEnd + 1)
    throw new Error(`${program.length} bytes do not fit the part's memory.`);
  const memory = new Uint8Array(part.flashEnd + 1).fill(0xff);
  memory.set(program);
  const cpu = new CPU(new Uint16Array(memory.buffer), part.ramEnd + 1 - registerSpace);
  const writes: RegisterWrite[] = [];
  let portWriteCount = 0;
  for (const [letter, { port, ddr }] of Object.entries(part.ports)) {
    cpu.writeHooks[port] = (value) => {
      portWriteCount += 1;
      writes.push({ register: `PORT${letter}`, value, cycle: cpu.cycles });
    };
    cpu.writeHooks[ddr] = (value) => void writes.push({ register: `DDR${letter}`, value, cycle: cpu.cycles });
  }
  while (portWriteCount < wantedPortWrites) {
    if (cpu.cycles > cycleLimit)
      throw new Error(`Only ${portWriteCount} port writes in ${cycleLimit} cycles.`);
    avrInstruction(cpu);
    cpu.tick();
  }
  return writes;
}
