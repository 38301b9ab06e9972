import { avrTickCycles } from '../../../shared/firmware/pattern.ts';
import { simulate } from '../support/avr-simulator.ts';
import { avrPart, avrProgram } from '../support/compilers.ts';
import { everyWarning } from './c-programs.ts';
import { mustEqual } from './cases.ts';
import { exportedWith, longCase, patternCases, randomCases } from './pattern-cases.ts';
import { everyEdge, mustPrintEdges, printing, programs, proofsOf } from './pattern-edges.ts';
import type { Proof } from './proof.ts';
import { cortexM, riscv, type Processor } from './simulated-boards.ts';
import { printedBy } from './simulated-runs.ts';

const mcu = 'attiny4313';

/** avr: each tick between two port writes, so that its cycles show. */
export async function provePulsesOnAvr(): Promise<Proof[]> {
  const part = await avrPart(mcu, ['B', 'D']);
  const short = [...patternCases, ...randomCases(6, 12)];
  const cases = [...short, { ...longCase, ticks: 60_100 }];
  const all = programs('avr', cases).map((one) => ({
    ...one,
    files: exportedWith(one.pattern, 'avr', one.name, { playback: 'none' }),
  }));
  let most = 0;
  const proofs: Proof[] = [];
  for (const { name, title, ticks, files, edges } of all) {
    const main = `#include <avr/io.h>
#include "${name}_pulses.h"
int main(void)
{
    uint32_t k;
    ${name}_pulses_start();
    for (k = 0u; k < ${ticks}u; ++k) {
        __asm__ volatile("out %[d], __zero_reg__\\n\\trcall ${name}_pulses_tick\\n\\tout %[b], r24"
            : : [d] "I"(_SFR_IO_ADDR(PORTD)), [b] "I"(_SFR_IO_ADDR(PORTB))
            : "r18", "r19", "r20", "r21", "r22", "r23", "r24", "r25", "r26", "r27", "r30", "r31", "memory");
    }
    for (;;) { }
}
`;
    const flags = ['-std=c99', '-Os', ...everyWarning];
    const program = await avrProgram([...files, { name: 'main.c', text: main }], mcu, flags);
    const { writes } = simulate(program, part, { wantedPortWrites: 2 * ticks, cycleLimit: 100_000_000 });
    const onPorts = writes.filter(({ register }) => register.startsWith('PORT'));
    const found: number[] = [];
    let tickCycles = 0;
    for (let k = 0; k < ticks; k += 1) {
      const [begin, end] = [onPorts[2 * k], onPorts[2 * k + 1]];
      // The write before it takes a cycle of its own.
      tickCycles = Math.max(tickCycles, end.cycle - begin.cycle - 1);
      if (end.value !== (k === 0 ? 0 : onPorts[2 * k - 1].value)) found.push(k);
    }
    mustEqual(found, edges, `avr, pulses, ${title}`);
    most = Math.max(most, tickCycles);
    proofs.push({
      case: `pulses, ${title}`,
      tool: 'avr-gcc, avr8js; Python',
      proven: 'every edge by the millisecond',
      tickCycles,
    });
  }
  if (most !== avrTickCycles) {
    throw new Error(`A tick takes at most ${most} cycles, where the files say ${avrTickCycles}.`);
  }
  return proofs;
}

/** Without a library: numbers go out by put(). */
async function provePulsesOn(processor: Processor): Promise<Proof[]> {
  const all = programs(processor.target, [...patternCases, ...randomCases(6, 12)]);
  const main = `#include <stdint.h>
void put(char byte);
static void number(unsigned long left) {
    char digits[12];
    int n = 0;
    put(' ');
    do { digits[n++] = (char)('0' + left % 10u); left /= 10u; } while (left != 0u);
    while (n > 0) { put(digits[--n]); }
}
${all.map(({ name }) => `#include "${name}_pulses.h"`).join('\n')}
${all.map((one) => printing(one, (value) => `number((unsigned long)${value});`)).join('\n')}
int main(void)
{
${all.map(({ name }) => `    run_${name}();\n    put('\\n');`).join('\n')}
    return 0;
}
`;
  const files = all.flatMap((one) => one.files);
  mustPrintEdges(await printedBy(processor, files, main), all, processor.target);
  const tool = `${processor.tools}gcc, ${processor.emulator[0]}; Python`;
  return proofsOf(all, tool, everyEdge);
}

export const provePulsesOnCortexM = () => provePulsesOn(cortexM);
export const provePulsesOnRiscv = () => provePulsesOn(riscv);
