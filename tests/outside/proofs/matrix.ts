import { proofsOf, targets } from '../../../shared/firmware/index.ts';
import { proveAvr } from './avr.ts';
import { proveC99Playback } from './c-playback.ts';
import { proveAsm, proveC99, proveCpp17 } from './c-programs.ts';
import {
  proveBinary,
  proveCsv,
  proveIntelHex,
  proveJson,
  provePython,
  proveVerilogMemh,
  proveWav,
} from './data-files.ts';
import { provePulsesInC99, provePulsesInCpp17 } from './pattern-c.ts';
import { provePulsesInJson, provePulsesInPython, provePulsesInRust } from './pattern-modules.ts';
import { provePulsesOnAvr, provePulsesOnCortexM, provePulsesOnRiscv } from './pattern-processors.ts';
import { proveCortexM, proveRiscv } from './processors.ts';
import type { Proof } from './proof.ts';
import { proveRust } from './rust.ts';

/** Each target with the proof of it. What is proven of one is stored in the repository, cycles and all. */
export const provers: Readonly<Record<string, () => Promise<Proof[]>>> = {
  c99: async () => [...(await proveC99()), ...(await proveC99Playback()), ...(await provePulsesInC99())],
  avr: async () => [...(await proveAvr()), ...(await provePulsesOnAvr())],
  cpp17: async () => [...(await proveCpp17()), ...(await provePulsesInCpp17())],
  'cortex-m': async () => [...(await proveCortexM()), ...(await provePulsesOnCortexM())],
  riscv: async () => [...(await proveRiscv()), ...(await provePulsesOnRiscv())],
  asm: proveAsm,
  rust: async () => [...(await proveRust()), ...(await provePulsesInRust())],
  python: async () => [...(await provePython()), ...(await provePulsesInPython())],
  'verilog-memh': proveVerilogMemh,
  'intel-hex': proveIntelHex,
  binary: proveBinary,
  csv: proveCsv,
  json: async () => [...(await proveJson()), ...(await provePulsesInJson())],
  wav: proveWav,
};

export const storedProofs: Readonly<Record<string, readonly Proof[]>> = Object.fromEntries(
  targets.map(({ id }) => [id, proofsOf(id)]),
);

/** Where the proofs differ from what is stored: a line each. */
export function differencesFrom(kept: readonly Proof[] = [], proofs: readonly Proof[]): string[] {
  const count = Math.max(kept.length, proofs.length);
  return Array.from({ length: count }, (_, k) => [show(kept[k]), show(proofs[k])])
    .filter(([before, now]) => before !== now)
    .map(([before, now]) => `stored: ${before}; found: ${now}`);
}

const show = (proof: Proof | undefined) => (proof === undefined ? 'nothing' : JSON.stringify(proof));
