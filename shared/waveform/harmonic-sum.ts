import { transformOf } from '../analysis/index.ts';
import type { TableSettings } from '../contract/index.ts';
import { stepFraction } from './phases.ts';

/** One sine of a sum: `amplitude · sin(2π·harmonic·t + phaseRad)`. */
export interface Sine {
  readonly harmonic: number;
  readonly amplitude: number;
  readonly phaseRad: number;
}

type Sampling = Pick<TableSettings, 'length' | 'cycles' | 'startPhaseDeg' | 'sampleAt'>;

/** Sine and cosine of one period in N steps, interleaved; kept for the last few lengths. */
const unitCircles = new Map<number, Float64Array>();
const unitCirclesKept = 8;

function unitCircle(length: number): Float64Array {
  const known = unitCircles.get(length);
  if (known !== undefined) return known;
  const circle = new Float64Array(2 * length);
  for (let j = 0; j < length; j += 1) {
    const angle = (2 * Math.PI * j) / length;
    circle[2 * j] = Math.sin(angle);
    circle[2 * j + 1] = Math.cos(angle);
  }
  if (unitCircles.size >= unitCirclesKept) unitCircles.delete(unitCircles.keys().next().value as number);
  unitCircles.set(length, circle);
  return circle;
}

/**
 * Adds a sum of sines, all below the table's Nyquist limit (`2·harmonic·K < N`), to `out` at the table's
 * phases. Entry k of harmonic n stands at angle `2π·(n·K·k mod N)/N` plus a constant: whole numbers under
 * the modulo keep long tables exact. Few sines are added one by one, many through one inverse DFT.
 */
export function addSines(out: Float64Array, sines: readonly Sine[], table: Sampling): void {
  const { length } = table;
  const oneTransform = 3 * Math.log2(length) * ((length & (length - 1)) === 0 ? 1 : 8);
  if (sines.length > oneTransform) addByTransform(out, sines, table);
  else for (const sine of sines) addOne(out, sine, table);
}

/** Angle of a sine at the table's first entry, in radians. */
function firstAngle({ harmonic, phaseRad }: Sine, table: Sampling): number {
  const { length, cycles, startPhaseDeg } = table;
  const turns = (harmonic * stepFraction(table) * cycles) / length + (harmonic * startPhaseDeg) / 360;
  return 2 * Math.PI * (turns % 1) + phaseRad;
}

function addOne(out: Float64Array, sine: Sine, table: Sampling): void {
  const { length, cycles } = table;
  const angle = firstAngle(sine, table);
  const inPhase = sine.amplitude * Math.cos(angle);
  const quadrature = sine.amplitude * Math.sin(angle);
  const unit = unitCircle(length);
  const step = (sine.harmonic * cycles) % length;
  let at = 0;
  for (let k = 0; k < length; k += 1) {
    out[k] += inPhase * unit[2 * at] + quadrature * unit[2 * at + 1];
    at += step;
    if (at >= length) at -= length;
  }
}

function addByTransform(out: Float64Array, sines: readonly Sine[], table: Sampling): void {
  const { length, cycles } = table;
  // Conjugate coefficients under a forward transform give the conjugate of the wanted sum.
  const data = new Float64Array(2 * length);
  for (const sine of sines) {
    const angle = firstAngle(sine, table);
    const bin = sine.harmonic * cycles;
    data[2 * bin] += sine.amplitude * Math.cos(angle);
    data[2 * bin + 1] -= sine.amplitude * Math.sin(angle);
  }
  const sum = new Float64Array(2 * length);
  transformOf(length).forward(sum, data);
  for (let k = 0; k < length; k += 1) out[k] -= sum[2 * k + 1];
}
