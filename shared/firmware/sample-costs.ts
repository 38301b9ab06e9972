import { mainInstructionCycles, responseCycles, simulatedResponseCycles } from './avr/response.ts';
import { proofs, type TargetProof } from './proofs.ts';

/** What one sample costs in a playback code that was proven. */
export interface SampleCost {
  /** Target and case: `avr timer, 256 × 8`. */
  readonly id: string;
  readonly target: string;
  /** Option of the target: `timer`. */
  readonly playback: string;
  /** Table and what else was set: `256 × 8`. */
  readonly table: string;
  /** Cycles of a handler or from word to word of a loop, by a simulator; or instructions, out of the disassembly. */
  readonly found: 'handler cycles' | 'loop cycles' | 'instructions';
  readonly figure: number;
  /** Cycles by which the data sheets' response to an interrupt is longer than the simulator's. */
  readonly responseCycles: number;
  /** Cycles of the main program's longest instruction, which may have begun. */
  readonly mainCycles: number;
  /** Cycles by which a handler's first write varies, as measured: in the exported program, and with calls in its main. */
  readonly entryVariesBy?: number;
  readonly entryVariesWithCalls?: number;
  /** The worst case: the three together. Instructions count for one cycle each, as long as nobody has measured them. */
  readonly inAll: number;
}

/** Every playback code that has a figure, in the order of the proofs. */
export function sampleCosts(): SampleCost[] {
  return Object.entries(proofs).flatMap(([target, ofTarget]) =>
    ofTarget.flatMap((proof) => costOf(target, proof) ?? []),
  );
}

function costOf(target: string, proof: TargetProof): SampleCost | undefined {
  const found = foundIn(proof);
  if (found === undefined) return undefined;
  const [playback, ...table] = proof.case.split(', ');
  // Handlers have cycles on AVR alone.
  const isHandler = found[0] === 'handler cycles';
  const response = isHandler ? responseCycles - simulatedResponseCycles : 0;
  const main = isHandler ? mainInstructionCycles : 0;
  return {
    id: `${target} ${proof.case}`,
    target,
    playback,
    table: table.join(', '),
    found: found[0],
    figure: found[1],
    responseCycles: response,
    mainCycles: main,
    entryVariesBy: proof.entryVariesBy,
    entryVariesWithCalls: proof.entryVariesWithCalls,
    inAll: found[1] + response + main,
  };
}

function foundIn({
  handlerCycles,
  cyclesPerWord,
  instructions,
}: TargetProof): [SampleCost['found'], number] | undefined {
  if (handlerCycles !== undefined) return ['handler cycles', handlerCycles];
  if (cyclesPerWord !== undefined) return ['loop cycles', cyclesPerWord];
  return instructions === undefined ? undefined : ['instructions', instructions];
}
