import { cyclesIn, label, line, type Line } from './assembly.ts';
import type { PortLoop } from './port-loop.ts';
import { sampleBlock, type LoopShape } from './sample.ts';

export interface AccumulatorShape extends LoopShape {
  readonly accumulatorBits: 16 | 24 | 32;
  /** Table length 2^indexBits. */
  readonly indexBits: number;
}

/** Registers of the accumulator, the lowest byte first; its top byte is the low one of Z where that is the index. */
const accumulatorRegisters = ['r24', 'r25', 'r26', 'r27'];
const stepOperands = ['%A[step]', '%B[step]', '%C[step]', '%D[step]'];

/** Whether the accumulator's top byte itself is the low byte of Z. */
const topIsPointer = ({ indexBits, ports }: AccumulatorShape) => indexBits === 8 && ports.length === 1;

/** Whether the low byte of Z alone moves. */
const indexIsOneByte = ({ indexBits, ports }: AccumulatorShape) => indexBits <= 8 && ports.length === 1;

/** Boundary in bytes that the loop needs its table on, so that the high byte of Z stays; 0 for none. */
export const alignmentOf = (shape: AccumulatorShape) => (indexIsOneByte(shape) ? 2 ** shape.indexBits : 0);

/** A loop that adds the step to the accumulator for each word; operand `step` is an unsigned integer of its bits. */
export function accumulatorLoop(shape: AccumulatorShape): PortLoop {
  const bytes = shape.accumulatorBits / 8;
  const registers = accumulatorRegisters.slice(4 - bytes);
  if (topIsPointer(shape)) registers[bytes - 1] = 'r30';
  const add = registers.map((register, k) =>
    line(k === 0 ? 'add' : 'adc', `${register}, ${stepOperands[k]}`),
  );
  const turn = [...add, ...pointerOf(shape), ...sampleBlock(shape, false), line('rjmp', '1b')];
  const start = registers.map((register) => line('ldi', `${register}, 0`));
  if (indexIsOneByte(shape)) start.push(line('ldi', `r31, hi8(${shape.table})`));
  return { lines: [...start, label('1'), ...turn], cyclesPerWord: cyclesIn(turn) };
}

/** Z at the word that the accumulator's upper bits stand for. */
function pointerOf(shape: AccumulatorShape): Line[] {
  if (topIsPointer(shape)) return [];
  const { indexBits, ports, table } = shape;
  if (indexIsOneByte(shape)) {
    const shifts = Array.from({ length: 8 - indexBits }, () => line('lsr', 'r30'));
    return [line('mov', 'r30, r27'), ...shifts, line('subi', `r30, lo8(-(${table}))`)];
  }
  // The offset is the index times the word's bytes: its bits end one place higher for two.
  const offsetBits = indexBits + ports.length - 1;
  const toZ = [line('mov', 'r31, r27'), line('mov', 'r30, r26')];
  const shifts = Array.from({ length: 16 - offsetBits }, () => [
    line('lsr', 'r31'),
    line('ror', 'r30'),
  ]).flat();
  const even = ports.length === 2 ? [line('andi', 'r30, 0xFE')] : [];
  const base = [line('subi', `r30, lo8(-(${table}))`), line('sbci', `r31, hi8(-(${table}))`)];
  return [...toZ, ...shifts, ...even, ...base];
}
