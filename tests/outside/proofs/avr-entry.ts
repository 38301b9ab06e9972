import type { SimulatedRun } from '../support/avr-simulator.ts';

// How late an interrupt's write comes hangs on the instruction that the timer's match falls into: it ends first (data
// sheets, "Interrupt Response Time"). The response itself and the way to the write are the same each time. The timer
// has to meet a main program at every cycle of its loop, or the measurement does not count.

/** Cycles of the loop that the exported main program waits in: one jump (AVR Instruction Set, RJMP). */
export const mainLoopCycles = 2;

const emptyLoop = / {4}for \(;;\) \{\n {4}\}\n/;

/**
 * Puts instructions of 1 to 4 cycles in the place of the main program's empty loop: NOP 1, RJMP 2, LPM 3, a call of 3
 * (RCALL) or, on parts of more than 8 KiB, 4 (CALL), RET 4, RJMP 2 twice (AVR Instruction Set, 16-bit program counter).
 */
export function busyLoop(main: string): string {
  if (!emptyLoop.test(main)) throw new Error('The main program waits in no empty loop.');
  return main.replace(
    emptyLoop,
    `    for (;;) {
        __asm__ volatile("nop\\n\\tnop\\n\\tnop\\n\\trjmp 1f\\n1:\\tlpm\\n\\t%~call 2f\\n\\trjmp 3f\\n2:\\tret\\n3:" ::: "r0");
    }
`,
  );
}

/** Cycles of that loop: a prime number, so that no period of the timer skips any of them. */
export const busyLoopCycles = (isLarge: boolean) => (isLarge ? 20 : 19);

interface Met {
  readonly run: SimulatedRun;
  readonly loopCycles: number;
}

/**
 * Cycles by which the write varies from interrupt to interrupt: in the exported program, and with calls and returns in
 * the main program.
 *
 * @throws where an alignment was not met, or the exported file says something else
 */
export function mustVary(title: string, main: string, [own, busy]: readonly [Met, Met]) {
  const found = [spreadOf(title, own), spreadOf(title, busy)];
  const [, ...said] = /varies by (\d+); with calls and returns in it by up to (\d+)\./.exec(main) ?? [];
  if (said.join() !== found.join()) {
    throw new Error(
      `${title}: entry varies by ${found.join(', ')} cycles, where the file says ${said.join(', ')}.`,
    );
  }
  return { entryVariesBy: found[0], entryVariesWithCalls: found[1] };
}

function spreadOf(title: string, { run: { entries }, loopCycles }: Met): number {
  const alignments = new Set(entries.map(({ from, counts }) => `${from} ${counts}`));
  if (alignments.size !== loopCycles) {
    throw new Error(`${title}: the timer met ${alignments.size} of ${loopCycles} alignments.`);
  }
  const counts = entries.map((entry) => entry.counts);
  return Math.max(...counts) - Math.min(...counts);
}
