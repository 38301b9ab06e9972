import { transformOf } from './transform.ts';

/** DFT of real signals of one size: lines k = 0…⌊N/2⌋, unscaled, interleaved re, im. */
export interface RealTransform {
  readonly size: number;
  /** ⌊N/2⌋ + 1. */
  readonly bins: number;
  /** Fills `lines` (2·bins numbers) from `signal` (N numbers). The two must be different arrays. */
  readonly forward: (lines: Float64Array, signal: Float64Array) => void;
  /** The largest |X_k|, k ≥ 1, that at N/2 halved as it has no mirror line: what `forward` gives, to the last bit. */
  readonly strongest: (signal: Float64Array) => number;
  /** Arrays of N and twice 2·bins numbers for any caller's use; what they hold lasts until the next caller's. */
  readonly signal: Float64Array;
  readonly lines: Float64Array;
  readonly otherLines: Float64Array;
}

/** Plans kept for reuse, oldest first, by the same measure as those of complex transforms. */
const plans = new Map<number, RealTransform>();
const entriesKept = 2 ** 18;

/** The transform of real signals of any size ≥ 1; of an even one at half the cost of a complex transform. */
export function realTransformOf(size: number): RealTransform {
  const known = plans.get(size);
  if (known !== undefined) return known;
  const bins = Math.floor(size / 2) + 1;
  const plan = {
    size,
    bins,
    ...(size % 2 === 0 ? halfSizeTransform(size) : wholeTransform(size, bins)),
    signal: new Float64Array(size),
    lines: new Float64Array(2 * bins),
    otherLines: new Float64Array(2 * bins),
  };
  let kept = size;
  for (const other of plans.keys()) kept += other;
  for (const oldest of plans.keys()) {
    if (kept <= entriesKept) break;
    plans.delete(oldest);
    kept -= oldest;
  }
  plans.set(size, plan);
  return plan;
}

type Ways = Pick<RealTransform, 'forward' | 'strongest'>;

function wholeTransform(size: number, bins: number): Ways {
  const whole = (signal: Float64Array): Float64Array => {
    const { data, out, forward } = transformOf(size);
    for (let n = 0; n < size; n += 1) {
      data[2 * n] = signal[n];
      data[2 * n + 1] = 0;
    }
    forward(out, data);
    return out;
  };
  return {
    forward: (lines, signal) => {
      const out = whole(signal);
      for (let i = 0; i < 2 * bins; i += 1) lines[i] = out[i];
    },
    strongest: (signal) => {
      const out = whole(signal);
      let power = 0;
      for (let k = 1; k < bins; k += 1) {
        power = Math.max(power, out[2 * k] * out[2 * k] + out[2 * k + 1] * out[2 * k + 1]);
      }
      return Math.sqrt(power);
    },
  };
}

/**
 * Of an even N by a complex transform of M = N/2: with `z_m = x_{2m} + i·x_{2m+1}`, which is how the signal lies in
 * memory, `X_k = (Z_k + conj Z_{M−k})/2 − i·e^(−2πi·k/N)·(Z_k − conj Z_{M−k})/2`. Lines k and M−k come from the same
 * two, so that they are made in pairs: with S the sum and D the turned difference, `X_k = S + D` and
 * `X_{M−k} = conj(S − D)`.
 */
function halfSizeTransform(size: number): Ways {
  const half = size / 2;
  const quarter = Math.floor(half / 2);
  const turns = new Float64Array(2 * quarter + 2);
  for (let k = 0; k <= quarter; k += 1) {
    // −i·e^(−iα)/2 = (−sin α − i·cos α)/2
    const angle = (2 * Math.PI * k) / size;
    turns[2 * k] = -Math.sin(angle) / 2;
    turns[2 * k + 1] = -Math.cos(angle) / 2;
  }
  return {
    forward: (lines, signal) => {
      const { out, forward } = transformOf(half);
      forward(out, signal);
      lines[0] = out[0] + out[1];
      lines[1] = 0;
      lines[size] = out[0] - out[1];
      lines[size + 1] = 0;
      for (let k = 1; k <= quarter; k += 1) {
        const near = 2 * k;
        const far = size - near;
        const sumRe = (out[near] + out[far]) / 2;
        const sumIm = (out[near + 1] - out[far + 1]) / 2;
        const differenceRe = out[near] - out[far];
        const differenceIm = out[near + 1] + out[far + 1];
        const turnedRe = turns[near] * differenceRe - turns[near + 1] * differenceIm;
        const turnedIm = turns[near] * differenceIm + turns[near + 1] * differenceRe;
        lines[near] = sumRe + turnedRe;
        lines[near + 1] = sumIm + turnedIm;
        lines[far] = sumRe - turnedRe;
        lines[far + 1] = turnedIm - sumIm;
      }
    },
    // The same steps, but that no line is kept: half of the time would go into writing and reading them.
    strongest: (signal) => {
      const { out, forward } = transformOf(half);
      forward(out, signal);
      let power = 0;
      for (let k = 1; k <= quarter; k += 1) {
        const near = 2 * k;
        const far = size - near;
        const sumRe = (out[near] + out[far]) / 2;
        const sumIm = (out[near + 1] - out[far + 1]) / 2;
        const differenceRe = out[near] - out[far];
        const differenceIm = out[near + 1] + out[far + 1];
        const turnedRe = turns[near] * differenceRe - turns[near + 1] * differenceIm;
        const turnedIm = turns[near] * differenceIm + turns[near + 1] * differenceRe;
        const nearRe = sumRe + turnedRe;
        const nearIm = sumIm + turnedIm;
        const farRe = sumRe - turnedRe;
        const farIm = turnedIm - sumIm;
        const nearPower = nearRe * nearRe + nearIm * nearIm;
        const farPower = farRe * farRe + farIm * farIm;
        if (nearPower > power) power = nearPower;
        if (farPower > power) power = farPower;
      }
      return Math.max(Math.sqrt(power), Math.abs(out[0] - out[1]) / 2);
    },
  };
}
