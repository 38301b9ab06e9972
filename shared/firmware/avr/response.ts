/** Cycles of the response to an interrupt by the data sheets, on parts whose program counter has two bytes. */
export const responseCycles = 4;
/** What the simulator avr8js charges for it. */
export const simulatedResponseCycles = 2;
/** The jump that a vector is on parts up to 8 KiB. */
export const vectorCycles = 2;
/**
 * The longest instruction of the main program as it is exported: the jump that it waits in. It ends before an interrupt
 * is answered, and one instruction runs between two of them (data sheets, "Reset and Interrupt Handling").
 */
export const mainInstructionCycles = 2;
/** The longest instruction of any main program: a call or a return, with a program counter of two bytes (AVR Instruction Set). */
export const longestInstructionCycles = 4;
