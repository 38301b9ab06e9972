/** A line of assembly with the clock cycles it takes; a branch has those of the way that is meant. */
export interface Line {
  readonly text: string;
  readonly cycles: number;
}

/** Cycles of the AVR instructions that loops are made of, of a part with a 16-bit program counter (AVR Instruction Set). */
const cyclesOf: Readonly<Record<string, number>> = {
  adc: 1,
  add: 1,
  andi: 1,
  cpc: 1,
  cpi: 1,
  dec: 1,
  in: 1,
  ld: 2,
  ldi: 1,
  lds: 2,
  lpm: 3,
  lsr: 1,
  mov: 1,
  nop: 1,
  or: 1,
  out: 1,
  pop: 2,
  push: 2,
  reti: 4,
  rjmp: 2,
  ror: 1,
  sbci: 1,
  sts: 2,
  subi: 1,
};

export function line(instruction: string, operands = ''): Line {
  return {
    text: operands === '' ? instruction : `${instruction} ${operands}`,
    cycles: cyclesOf[instruction],
  };
}

/** A branch back that is taken, or one that falls through. */
export const taken = (label: string): Line => ({ text: `brne ${label}`, cycles: 2 });

/** A line off the longest way, which cycles are counted on. */
export const aside = ({ text }: Line): Line => ({ text, cycles: 0 });

/** Lines that only take time, as few words as they can be. */
export function wait(cycles: number): Line[] {
  const lines: Line[] = [];
  let left = cycles;
  for (; left >= 2; left -= 2) lines.push({ text: 'rjmp .+0', cycles: 2 });
  if (left === 1) lines.push(line('nop'));
  return lines;
}

export const label = (name: string): Line => ({ text: `${name}:`, cycles: 0 });

export const cyclesIn = (lines: readonly Line[]) => lines.reduce((sum, { cycles }) => sum + cycles, 0);
