import { transformOf } from '../dft/index.ts';
import type { Response } from './lines.ts';
import { pinDelayFrames } from './kernel-shape.ts';
import { besselI0 } from './step-kernel.ts';

/** Zero crossings of the sinc on each side. */
const reach = 32;
const kaiserBeta = 10;
const stepsOfCrossing = 512;

/** Frames of one pass, to be played once from the first on. */
export interface Pass {
  readonly frames: Float32Array<ArrayBuffer>;
  /** The frame at which the first entry is due; that of a `PinPlayer` comes as late. */
  readonly firstEntryFrame: number;
}

/**
 * One pass through a table as the smooth curve through its entries, silence before and after.
 *
 * Each frame is the sum of entries under a Kaiser-windowed sinc of 32 zero crossings a side whose cut-off is half of the
 * lower of the two rates, read from a table of 512 steps a crossing: flat within 0.01 dB up to 0.44 of the lower rate, and
 * below −90 dB from 0.56 of it on.
 *
 * @param values one value an entry, the mean taken out
 * @param sampleRateHz rate at which the table is stepped through, above 0
 * @param response of what follows
 */
export function renderPass(
  values: Float64Array,
  sampleRateHz: number,
  contextRateHz: number,
  response?: Response,
): Pass {
  const ratio = Math.min(1, contextRateHz / sampleRateHz);
  const reachEntries = reach / ratio;
  const stepEntries = sampleRateHz / contextRateHz;
  // Whole frames, so that frame `before` is the first entry.
  const before = Math.max(pinDelayFrames, Math.ceil(reachEntries / stepEntries));
  const count = before + Math.ceil((values.length + reachEntries) / stepEntries);
  const frames = new Float32Array(count);
  const table = kernel();
  const toStep = ratio * stepsOfCrossing;
  for (let i = 0; i < count; i += 1) {
    const at = (i - before) * stepEntries;
    const first = Math.max(0, Math.ceil(at - reachEntries));
    const last = Math.min(values.length - 1, Math.floor(at + reachEntries));
    let sum = 0;
    for (let k = first; k <= last; k += 1) {
      const step = Math.abs(k - at) * toStep;
      const below = Math.floor(step);
      sum += values[k] * (table[below] + (step - below) * (table[below + 1] - table[below]));
    }
    frames[i] = ratio * sum;
  }
  return {
    frames: response === undefined ? frames : behind(frames, contextRateHz, response),
    firstEntryFrame: before,
  };
}

let kernelTable: Float64Array | undefined;

/** `sinc(u)` under a Kaiser window (J. F. Kaiser, 1974), β = 10, for 0 ≤ u ≤ reach, 512 values a crossing. */
function kernel(): Float64Array {
  if (kernelTable !== undefined) return kernelTable;
  const count = reach * stepsOfCrossing;
  // Two more, so that reading between neighbours needs no test for the end.
  const table = new Float64Array(count + 2);
  const unit = besselI0(kaiserBeta);
  for (let i = 0; i <= count; i += 1) {
    const u = i / stepsOfCrossing;
    const window = besselI0(kaiserBeta * Math.sqrt(1 - (u / reach) ** 2)) / unit;
    table[i] = i === 0 ? 1 : (window * Math.sin(Math.PI * u)) / (Math.PI * u);
  }
  kernelTable = table;
  return table;
}

/** The frames behind a response, by transform; as much silence again is there for what rings on. */
function behind(frames: Float32Array, contextRateHz: number, response: Response): Float32Array<ArrayBuffer> {
  let size = 64;
  while (size < 2 * frames.length) size *= 2;
  const { data, out, forward } = transformOf(size);
  data.fill(0);
  for (let i = 0; i < frames.length; i += 1) data[2 * i] = frames[i];
  forward(out, data);
  const gain = new Float64Array(2);
  data.fill(0);
  for (let k = 0; k < size / 2; k += 1) {
    response((k * contextRateHz) / size, gain);
    const weight = (k === 0 ? 1 : 2) / size;
    // Conjugated, the forward transform serves as the inverse.
    data[2 * k] = weight * (out[2 * k] * gain[0] - out[2 * k + 1] * gain[1]);
    data[2 * k + 1] = -weight * (out[2 * k] * gain[1] + out[2 * k + 1] * gain[0]);
  }
  forward(out, data);
  return Float32Array.from({ length: size }, (_, i) => out[2 * i]);
}
