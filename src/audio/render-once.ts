/** Zero crossings of the sinc on each side. */
const reach = 32;
const kaiserBeta = 10;
const stepsOfCrossing = 512;

/** Fade at both ends of a pass: 50 ms, or a tenth of a pass that is shorter than half a second. */
export function onceFadeSeconds(passSeconds: number): number {
  return Math.min(0.05, passSeconds / 10);
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

/** Modified Bessel function of the first kind and order 0, by its power series. */
function besselI0(x: number): number {
  let sum = 1;
  let term = 1;
  for (let k = 1; term > 1e-17 * sum; k += 1) {
    term *= (x / (2 * k)) ** 2;
    sum += term;
  }
  return sum;
}

/**
 * Renders one pass through a table for the context's rate, without its mean, with a fade at both ends.
 *
 * Method: each frame is the sum of entries under a Kaiser-windowed sinc of 32 zero crossings a side whose cut-off is
 * half of the lower of the two rates, read from a table of 512 steps a crossing. Error: flat within 0.01 dB up to
 * 0.44 of the lower rate, and below −90 dB from 0.56 of it on, so that neither images nor folded lines are heard.
 *
 * @param values entries of the table, −1…1
 * @param sampleRateHz rate at which the table is stepped through, above 0
 * @param contextRateHz rate of the audio context, above 0
 * @returns the pass with `reach` periods of the lower rate before and after it
 */
export function renderOnce(
  values: Float64Array,
  sampleRateHz: number,
  contextRateHz: number,
): Float32Array<ArrayBuffer> {
  const ratio = Math.min(1, contextRateHz / sampleRateHz);
  const reachEntries = reach / ratio;
  const stepEntries = sampleRateHz / contextRateHz;
  const frames = Math.ceil((values.length + 2 * reachEntries) / stepEntries);
  const pass = new Float32Array(frames);
  const mean = meanOf(values);
  const table = kernel();
  const toStep = ratio * stepsOfCrossing;
  for (let i = 0; i < frames; i += 1) {
    const at = i * stepEntries - reachEntries;
    const first = Math.max(0, Math.ceil(at - reachEntries));
    const last = Math.min(values.length - 1, Math.floor(at + reachEntries));
    let sum = 0;
    for (let k = first; k <= last; k += 1) {
      const step = Math.abs(k - at) * toStep;
      const below = Math.floor(step);
      sum += (values[k] - mean) * (table[below] + (step - below) * (table[below + 1] - table[below]));
    }
    pass[i] = ratio * sum;
  }
  fadeEnds(pass, Math.round(onceFadeSeconds(frames / contextRateHz) * contextRateHz));
  return pass;
}

function meanOf(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value;
  return sum / values.length;
}

function fadeEnds(pass: Float32Array, fadeFrames: number): void {
  for (let i = 0; i < fadeFrames; i += 1) {
    const gain = 0.5 - 0.5 * Math.cos((Math.PI * (i + 0.5)) / fadeFrames);
    pass[i] *= gain;
    pass[pass.length - 1 - i] *= gain;
  }
}
