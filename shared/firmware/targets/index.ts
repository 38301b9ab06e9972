import type { Target } from '../target.ts';
import { asm } from './asm.ts';
import { avr } from './avr.ts';
import { binary } from './binary.ts';
import { c99 } from './c99.ts';
import { cortexM } from './cortex-m.ts';
import { cpp17 } from './cpp17.ts';
import { csv } from './csv.ts';
import { intelHex } from './intel-hex.ts';
import { json } from './json.ts';
import { python } from './python.ts';
import { riscv } from './riscv.ts';
import { rust } from './rust.ts';
import { verilogMemh } from './verilog-memh.ts';
import { wav } from './wav.ts';

/** Every export there is, in the order of lists. A new one: its descriptor here, its folder under `templates/`. */
export const targets: readonly Target[] = [
  c99,
  avr,
  cpp17,
  cortexM,
  riscv,
  asm,
  rust,
  python,
  verilogMemh,
  intelHex,
  binary,
  csv,
  json,
  wav,
];
