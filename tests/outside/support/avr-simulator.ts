import { avrInstruction, AVRTimer, CPU, timer1Config } from 'avr8js';
import { avrValues, type AvrPart } from './compilers.ts';

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

/** What a run of a program came to. */
export interface SimulatedRun {
  readonly writes: readonly RegisterWrite[];
  /** Cycles of each pass of the timer's handler, from the processor's response to the end of the return. */
  readonly handlerCycles: readonly number[];
  /** Cycles from the response to the first write of a port in it. */
  readonly writeDelays: readonly number[];
  /** What each interrupt came into, and how late its first write of a port was. */
  readonly entries: readonly TimerEntry[];
}

export interface TimerEntry {
  /** Address of the instruction that the main program goes on with. */
  readonly from: number;
  /** Counts of the timer from its return to 0, on the match, to the write; cycles at prescaler 1. */
  readonly counts: number;
}

/**
 * Timer 1 of a part by its names' values. Larger parts have registers of flags and of the mask for each timer, and
 * vectors of two words.
 */
export async function timerOf(mcu: string, isLarge = false): Promise<Readonly<Record<string, number>>> {
  const own = isLarge ? ['TIFR1', 'TIMSK1'] : ['TIFR', 'TIMSK'];
  const names = [
    ...['OCR1A', 'OCR1B', 'ICR1', 'TCNT1', 'TCCR1A', 'TCCR1B', 'TCCR1C'],
    ...['TOV1', 'OCF1A', 'OCF1B', 'TOIE1', 'OCIE1A', 'OCIE1B', 'TIMER1_COMPA_vect_num'],
  ];
  const { [own[0]]: TIFR, [own[1]]: TIMSK, ...values } = await avrValues(mcu, [...own, ...names]);
  const vector = values.TIMER1_COMPA_vect_num * (isLarge ? 2 : 1);
  return { ...values, TIFR, TIMSK, vector };
}

const returnFromInterrupt = 0x9518;

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
  return [...simulate(program, part, { wantedPortWrites, cycleLimit }).writes];
}

/** The same with the part's timer 1, as `timerOf` has it, where the program waits for its interrupt. */
export function simulate(
  program: Uint8Array,
  part: AvrPart,
  wanted: {
    readonly wantedPortWrites: number;
    readonly cycleLimit?: number;
    readonly timer?: Readonly<Record<string, number>>;
  },
): SimulatedRun {
  const { wantedPortWrites, cycleLimit = 10_000_000, timer } = wanted;
  if (program.length > part.flashEnd + 1)
    throw new Error(`${program.length} bytes do not fit the part's memory.`);
  const memory = new Uint8Array(part.flashEnd + 1).fill(0xff);
  memory.set(program);
  const cpu = new CPU(new Uint16Array(memory.buffer), part.ramEnd + 1 - registerSpace);
  const running = timer && addTimer(cpu, timer);
  const writes: RegisterWrite[] = [];
  const handlerCycles: number[] = [];
  const writeDelays: number[] = [];
  const entries: TimerEntry[] = [];
  let from = 0;
  let portWriteCount = 0;
  let responseAt: number | undefined;
  let hasWritten = false;
  for (const [letter, { port, ddr }] of Object.entries(part.ports)) {
    cpu.writeHooks[port] = (value) => {
      portWriteCount += 1;
      writes.push({ register: `PORT${letter}`, value, cycle: cpu.cycles });
      if (running !== undefined && responseAt !== undefined && !hasWritten) {
        writeDelays.push(cpu.cycles - responseAt);
        entries.push({ from, counts: running.debugTCNT });
      }
      hasWritten = true;
    };
    cpu.writeHooks[ddr] = (value) => void writes.push({ register: `DDR${letter}`, value, cycle: cpu.cycles });
  }
  while (portWriteCount < wantedPortWrites) {
    if (cpu.cycles > cycleLimit)
      throw new Error(`Only ${portWriteCount} port writes in ${cycleLimit} cycles.`);
    const isReturn = cpu.progMem[cpu.pc] === returnFromInterrupt;
    avrInstruction(cpu);
    if (isReturn && responseAt !== undefined) {
      handlerCycles.push(cpu.cycles - responseAt);
      responseAt = undefined;
    }
    const before = { cycles: cpu.cycles, pc: cpu.pc };
    cpu.tick();
    if (cpu.pc === timer?.vector && responseAt === undefined) {
      responseAt = before.cycles;
      from = before.pc;
      hasWritten = false;
    }
  }
  return { writes, handlerCycles, writeDelays, entries };
}

/** Timer 1 at a part's own addresses; `vector` is that of its compare A interrupt. */
function addTimer(cpu: CPU, at: Readonly<Record<string, number>>): AVRTimer {
  return new AVRTimer(cpu, {
    ...timer1Config,
    compAInterrupt: at.vector,
    TIFR: at.TIFR,
    OCRA: at.OCR1A,
    OCRB: at.OCR1B,
    OCRC: 0,
    ICR: at.ICR1,
    TCNT: at.TCNT1,
    TCCRA: at.TCCR1A,
    TCCRB: at.TCCR1B,
    TCCRC: at.TCCR1C,
    TIMSK: at.TIMSK,
    TOV: 1 << at.TOV1,
    OCFA: 1 << at.OCF1A,
    OCFB: 1 << at.OCF1B,
    OCFC: 0,
    TOIE: 1 << at.TOIE1,
    OCIEA: 1 << at.OCIE1A,
    OCIEB: 1 << at.OCIE1B,
    OCIEC: 0,
    compPortA: 0,
    compPortB: 0,
    compPortC: 0,
  });
}
