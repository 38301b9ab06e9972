/** A register of a simulated board that stands for a port: it keeps what is written to it, and is read back. */
export interface SimulatedPort {
  readonly address: string;
  /** How the simulator's trace names its address, where not so. */
  readonly tracedAs?: number;
}

/** A processor, its compiler and the simulated board that its programs run on. */
export interface Processor {
  readonly target: 'cortex-m' | 'riscv';
  readonly tools: string;
  readonly flags: readonly string[];
  /** Start-up code: calls main, then ends the simulation; `put(byte)` sends a byte out. */
  readonly startUp: string;
  readonly linkerScript: string;
  readonly emulator: readonly string[];
  /** Where a byte written is sent out by the simulated serial port. */
  readonly serialAddress: string;
  /** Two ports of 8 bits. */
  readonly ports: readonly [SimulatedPort, SimulatedPort];
  /** Takes words of 16 bits. */
  readonly port16: SimulatedPort;
  /** Takes words of 32 bits and keeps them. */
  readonly port32: SimulatedPort;
  readonly handler: string;
  /** C that lets the timer's interrupts in, and keeps them out for a while. */
  readonly letIn: string;
  readonly keepOut: string;
  /** C that has to run before `NAME_start`. */
  readonly prepare: string;
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
// For ports stand the registers CFG0 and CFG1 of the board's system controller and MISC of its FPGA I/O block, which
// QEMU keeps in any width (hw/misc/mps2-scc.c, hw/misc/mps2-fpgaio.c).
export const cortexM: Processor = {
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
  ports: [{ address: '0x4002F004' }, { address: '0x4002804C' }],
  port16: { address: '0x4002804C' },
  port32: { address: '0x4002804C' },
  handler: 'SysTick_Handler',
  letIn: '__asm__ volatile("cpsie i" : : : "memory");',
  keepOut: '__asm__ volatile("cpsid i" : : : "memory");',
  prepare: '',
};

// QEMU's board virt: RAM from 0x80000000, a 16550 at 0x10000000, the test device at 0x100000, the machine timer where
// the target's defaults have it (QEMU's documentation, "'virt' Generic Virtual Platform"). For ports stand the 16550's
// scratch register (8 bits), the interrupt line of the PCI host bridge (PCI Local Bus Specification 3.0, 6.2.4: 8 bits
// that software keeps there), for words of 16 bits that nobody reads back the 16550's modem status, which takes no
// writes, and for 32 bits the compare register of a second core's timer; that core is put to sleep.
export const riscv: Processor = {
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
    __asm__ volatile("csrr a0, mhartid\\n\\tbnez a0, 1f\\n\\tla sp, 0x80780000\\n\\tcall run\\n1:\\twfi\\n\\tj 1b");
}
void run(void) {
    (void)main();
    *(volatile uint32_t *)0x100000u = 0x5555u;
    for (;;) { }
}
`,
  linkerScript: flat('0x80000000', '0x80600000'),
  emulator: ['qemu-system-riscv32', '-M', 'virt', '-smp', '2', '-bios', 'none'],
  serialAddress: '0x10000000',
  ports: [{ address: '0x10000007' }, { address: '0x3000003C', tracedAs: 0x3c }],
  port16: { address: '0x10000006' },
  port32: { address: '0x02004008' },
  handler: 'wave_on_timer',
  letIn: '__asm__ volatile("csrsi mstatus, 8" : : : "memory");',
  keepOut: '__asm__ volatile("csrci mstatus, 8" : : : "memory");',
  prepare: '__asm__ volatile("csrw mtvec, %0" : : "r"(wave_on_timer));',
};
