import { transformOf } from '../dft/index.ts';
import type { StageParts } from '../output-stage/filter.ts';
import { finalOf, kernelReach as reach, kernelTerms, type StepKernel } from './kernel-shape.ts';
import { stagePoles, type Pole } from './stage-response.ts';

// How one edge of a pin sounds at the context's rate. Time is in frames of the context, T = 1/contextRateHz.
//
// The low-pass k(t) is a sinc of cut-off 22/48 of the rate under a Kaiser window of ±40 frames (J. F. Kaiser 1974,
// β = 10): flat within 0.001 dB up to 20/48 of the rate (20 kHz at 48 kHz), below −97 dB from 24/48 on, so that nothing
// folds back. An edge Δ at time t adds Δ·S(n − t), S the integral of k, to frame n.
//
// A stage of poles p_i behind the pin would make S as long as its slowest pole. So each pole is taken apart: e^(p·t) from
// 0 on, less e^(p·T) times the same one frame later, is an arc that ends after one frame; the recursion
// 1/Π(1 − e^(p_i·T)·z⁻¹) on whole frames puts the rest back, exactly. S with the arcs of all poles rises over 80 frames
// and one for each pole to `Π(1 − e^(p_i·T))`.
//
// What is stored is the rise from frame to frame, B(t) = S(t) − S(t−1), for each frame as a polynomial in where the edge
// lies between two frames: edges of one frame then need the sums of their powers alone, however many there are.

const kaiserBeta = 10;
/** Twice the cut-off over the context's rate. */
const cutoff = 22 / 24;
/** Frames, a power of two, that hold the longest kernel: 81 and one for each of at most four poles. */
const span = 128;
/** Points of k to a frame where its spectrum is taken. */
const fineness = 16;

let bare: StepKernel | undefined;

/**
 * The kernel for a context's rate, with what follows the pin.
 *
 * @param contextRateHz above 0
 */
export function stepKernel(contextRateHz: number, stage?: StageParts): StepKernel {
  const poles = stage === undefined ? [] : stagePoles(stage);
  if (poles.length > 0)
    return kernelOf(poles.map(({ re, im }) => ({ re: re / contextRateHz, im: im / contextRateHz })));
  bare ??= kernelOf([]);
  return bare;
}

const edgeFrom = 20 / 48;
const edgeTo = 24 / 48;
const edgeSteps = 256;
let edgeGains: Float64Array | undefined;

/** Magnitude of the low-pass at a frequency: 1 up to 20/48 of the context's rate, 0 from half of it on. Within 10⁻⁵. */
export function bandGain(hz: number, contextRateHz: number): number {
  const turns = hz / contextRateHz;
  if (turns <= edgeFrom) return 1;
  if (turns >= edgeTo) return 0;
  edgeGains ??= Float64Array.from({ length: edgeSteps + 2 }, (_, i) =>
    lowPassGain(edgeFrom + (i / edgeSteps) * (edgeTo - edgeFrom)),
  );
  const place = ((turns - edgeFrom) / (edgeTo - edgeFrom)) * edgeSteps;
  const below = Math.floor(place);
  return edgeGains[below] + (place - below) * (edgeGains[below + 1] - edgeGains[below]);
}

/** Every fourth point will do below half the context's rate: its own spectrum ends there. */
const coarse = 4;

function lowPassGain(turns: number): number {
  const points = lowPass();
  let sum = 0;
  for (let i = coarse; i < points.length; i += coarse) {
    sum += points[i] * Math.cos((2 * Math.PI * turns * i) / fineness);
  }
  return Math.abs(coarse * (points[0] + 2 * sum));
}

let lowPassPoints: Float64Array | undefined;

/** k at i/fineness frames, i = 0…reach·fineness, over their sum with their mirror images. */
function lowPass(): Float64Array {
  if (lowPassPoints !== undefined) return lowPassPoints;
  const points = new Float64Array(reach * fineness + 1);
  let sum = 0;
  for (let i = 0; i < points.length; i += 1) {
    const t = i / fineness;
    const x = Math.PI * cutoff * t;
    points[i] = besselI0(kaiserBeta * Math.sqrt(1 - (t / reach) ** 2)) * (i === 0 ? 1 : Math.sin(x) / x);
    sum += i === 0 ? points[i] : 2 * points[i];
  }
  for (let i = 0; i < points.length; i += 1) points[i] /= sum;
  lowPassPoints = points;
  return points;
}

/** Modified Bessel function of the first kind and order 0, by its power series. */
export function besselI0(x: number): number {
  let sum = 1;
  let term = 1;
  for (let k = 1; term > 1e-17 * sum; k += 1) {
    term *= (x / (2 * k)) ** 2;
    sum += term;
  }
  return sum;
}

/** @param poles in units of the context's rate: p·T */
function kernelOf(poles: readonly Pole[]): StepKernel {
  const taps = 2 * reach + 1 + poles.length;
  const spectrum = riseSpectrum(poles);
  const terms = new Float64Array(taps * kernelTerms);
  const heights: Float64Array[] = [];
  for (let node = 0; node < kernelTerms; node += 1) heights.push(riseAt(nodeAt(node), spectrum));
  const fitted = new Float64Array(kernelTerms);
  for (let j = 0; j < taps; j += 1) {
    polynomialThrough((node) => heights[node][j], fitted);
    terms.set(fitted, j * kernelTerms);
  }
  const feedback = feedbackOf(poles);
  settle(terms, taps, feedback);
  return { taps, terms, feedback };
}

/** B at −reach + j + (1 − u)/2 for j = 0…span−1: an edge late in its frame has risen less. */
function riseAt(u: number, spectrum: Float64Array): Float64Array {
  const { data, out, forward } = transformOf(span);
  data.fill(0);
  const bins = spectrum.length / 2;
  const t = (1 - u) / 2;
  // b(t) = Re Σ c_q·e^(2πi·q·t/span); on whole frames q counts modulo span. The transform turns the other way: conjugate.
  for (let q = 0; q < bins; q += 1) {
    const weight = (q === 0 ? 1 : 2) / span;
    const angle = (2 * Math.PI * q * t) / span;
    const c = weight * Math.cos(angle);
    const s = weight * Math.sin(angle);
    const place = 2 * (q % span);
    data[place] += spectrum[2 * q] * c - spectrum[2 * q + 1] * s;
    data[place + 1] -= spectrum[2 * q] * s + spectrum[2 * q + 1] * c;
  }
  forward(out, data);
  return Float64Array.from({ length: span }, (_, j) => out[2 * j]);
}

/**
 * Spectrum at q/span turns a frame of B shifted to begin at 0: k, times one frame's box, times each pole's arc
 * `−p/(iω − p)·(1 − e^(p − iω))`.
 */
function riseSpectrum(poles: readonly Pole[]): Float64Array {
  const size = span * fineness;
  const { data, out, forward } = transformOf(size);
  data.fill(0);
  const low = lowPass();
  for (let i = 0; i < low.length; i += 1) {
    data[2 * i] = low[i];
    if (i > 0) data[2 * (size - i)] = low[i];
  }
  forward(out, data);
  const bins = size / 2;
  const spectrum = new Float64Array(2 * bins);
  for (let q = 0; q < bins; q += 1) {
    const omega = (2 * Math.PI * q) / span;
    // The box from 0 to 1: (1 − e^(−iω))/(iω); and a shift by `reach`, so that nothing lies before 0.
    const half = omega / 2;
    const box = half === 0 ? 1 : Math.sin(half) / half;
    const turn = -half - reach * omega;
    let re = out[2 * q] * box * Math.cos(turn);
    let im = out[2 * q] * box * Math.sin(turn);
    for (const pole of poles) {
      const left = Math.exp(pole.re);
      const endRe = 1 - left * Math.cos(pole.im - omega);
      const endIm = -left * Math.sin(pole.im - omega);
      // −p/(iω − p)
      const belowIm = omega - pole.im;
      const below = pole.re * pole.re + belowIm * belowIm;
      const arcRe = (pole.re * pole.re - pole.im * belowIm) / below;
      const arcIm = (pole.re * pole.im + pole.re * belowIm) / below;
      const factorRe = arcRe * endRe - arcIm * endIm;
      const factorIm = arcRe * endIm + arcIm * endRe;
      const next = re * factorRe - im * factorIm;
      im = re * factorIm + im * factorRe;
      re = next;
    }
    spectrum[2 * q] = re;
    spectrum[2 * q + 1] = im;
  }
  return spectrum;
}

/**
 * Of each real pole `e^p`, of a pair `2·e^re·cos(im)` and `−e^(2·re)`. In sections, not multiplied out: slow poles that lie
 * close together keep their places, and the worst rounding leaves none outside the circle.
 */
function feedbackOf(poles: readonly Pole[]): Float64Array {
  const feedback = new Float64Array(4);
  const pair = poles.find(({ im }) => im !== 0);
  poles.filter(({ im }) => im === 0).forEach(({ re }, i) => (feedback[i] = Math.exp(re)));
  if (pair !== undefined) {
    feedback[2] = 2 * Math.exp(pair.re) * Math.cos(pair.im);
    feedback[3] = -Math.exp(2 * pair.re);
  }
  return feedback;
}

/** Chebyshev's nodes: the polynomial through them is nearly the best there is. */
const nodeAt = (node: number) => Math.cos((Math.PI * (node + 0.5)) / kernelTerms);

/** Fills `terms` with the coefficients of u⁰, u¹, … of the polynomial through the heights at all nodes. */
function polynomialThrough(heightAt: (node: number) => number, terms: Float64Array): void {
  terms.fill(0);
  let before = new Float64Array(kernelTerms);
  let chebyshev = new Float64Array(kernelTerms);
  chebyshev[0] = 1;
  for (let order = 0; order < kernelTerms; order += 1) {
    let weight = 0;
    for (let node = 0; node < kernelTerms; node += 1) {
      weight += heightAt(node) * Math.cos((Math.PI * order * (node + 0.5)) / kernelTerms);
    }
    weight *= (order === 0 ? 1 : 2) / kernelTerms;
    for (let i = 0; i < kernelTerms; i += 1) terms[i] += weight * chebyshev[i];
    // T₁ = u, T_{n+1} = 2u·T_n − T_{n−1}
    const next = new Float64Array(kernelTerms);
    for (let i = 1; i < kernelTerms; i += 1) next[i] = (order === 0 ? 1 : 2) * chebyshev[i - 1];
    if (order > 0) for (let i = 0; i < kernelTerms; i += 1) next[i] -= before[i];
    before = chebyshev;
    chebyshev = next;
  }
}

/**
 * Makes every edge rise to exactly what it must, wherever it lies, by what is missing of each power's sum (some 10⁻⁸),
 * spread over the middle: what is left would add up from edge to edge.
 */
function settle(terms: Float64Array, taps: number, feedback: Float64Array): void {
  const final = finalOf(feedback);
  for (let p = 0; p < kernelTerms; p += 1) {
    let sum = 0;
    for (let j = 0; j < taps; j += 1) sum += terms[j * kernelTerms + p];
    terms[reach * kernelTerms + p] += (p === 0 ? final : 0) - sum;
  }
}
