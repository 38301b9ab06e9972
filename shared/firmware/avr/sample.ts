import { cyclesIn, line, type Line } from './assembly.ts';

/** A port that a loop writes to: its letter, and what is done to a word's byte on the way. */
export interface LoopPort {
  readonly letter: string;
  /** Pins that the table drives. */
  readonly driven: number;
  /** Whether bits above those driven can be set in the byte and must be cleared: signs of two's complement. */
  readonly isMasked: boolean;
  /** Whether the other pins keep what they show: the port is read before it is written. */
  readonly isKept: boolean;
}

/** How a loop gets at its table and where it puts the words. */
export interface LoopShape {
  /** Symbol of the table. */
  readonly table: string;
  /** `lpm` from program memory, `ld` from RAM. */
  readonly load: 'lpm' | 'ld';
  /** One or two, that of the lower byte first. */
  readonly ports: readonly LoopPort[];
}

const dataRegisters = ['r18', 'r19'];
const portRegister = 'r23';
const hex = (value: number) => `0x${value.toString(16).toUpperCase().padStart(2, '0')}`;

/**
 * Reads the word at Z and writes it: two ports in two cycles, the upper byte first. Z then is behind the word, or at
 * its last byte.
 */
export function sampleBlock({ load, ports }: LoopShape, advance = true): Line[] {
  const reads = ports.map((_, k) => {
    const pointer = advance || k < ports.length - 1 ? 'Z+' : 'Z';
    return line(load, `${dataRegisters[k]}, ${pointer}`);
  });
  return [...reads, ...writeBlock(ports)];
}

/** The same of a word that is known: its bytes come in the instructions. */
export function immediateBlock({ ports }: LoopShape, word: number): Line[] {
  const bytes = ports.map((port, k) => (word >> (8 * k)) & (port.isMasked ? port.driven : 0xff));
  const plain = ports.map((port) => ({ ...port, isMasked: false }));
  return [...bytes.map((byte, k) => line('ldi', `${dataRegisters[k]}, ${hex(byte)}`)), ...writeBlock(plain)];
}

function writeBlock(ports: readonly LoopPort[]): Line[] {
  const readied = ports.flatMap(({ letter, driven, isMasked, isKept }, k) => [
    ...(isMasked ? [line('andi', `${dataRegisters[k]}, ${hex(driven)}`)] : []),
    ...(isKept
      ? [
          line('in', `${portRegister}, %[port${letter}]`),
          line('andi', `${portRegister}, ${hex(0xff & ~driven)}`),
          line('or', `${dataRegisters[k]}, ${portRegister}`),
        ]
      : []),
  ]);
  const written = ports.map(({ letter }, k) => line('out', `%[port${letter}], ${dataRegisters[k]}`));
  return [...readied, ...written.reverse()];
}

/** Whether a word's way from table to pin leaves the flags alone, so that a count may stand before it. */
export const keepsFlags = ({ ports }: LoopShape) =>
  ports.every(({ isMasked, isKept }) => !isMasked && !isKept);

export const sampleCycles = (shape: LoopShape) => cyclesIn(sampleBlock(shape));

/** Puts Z at the table's start: two cycles. */
export const rewind = ({ table }: LoopShape): Line[] => [
  line('ldi', `r30, lo8(${table})`),
  line('ldi', `r31, hi8(${table})`),
];
