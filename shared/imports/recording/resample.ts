/** Zeros of the sinc on each side that its window keeps. */
const zeros = 32;
/** Kaiser's window parameter: stopband near −90 dB (J. F. Kaiser, 1974). */
const beta = 9;
const stepsPerZero = 256;

/** Modified Bessel function I₀, by its series. */
function bessel0(x: number): number {
  let term = 1;
  let sum = 1;
  for (let k = 1; term > sum * 1e-17; k += 1) {
    term *= (x / (2 * k)) ** 2;
    sum += term;
  }
  return sum;
}

const kernel = Float64Array.from({ length: zeros * stepsPerZero + 2 }, (_, i) => {
  const at = i / stepsPerZero;
  if (at >= zeros) return 0;
  const window = bessel0(beta * Math.sqrt(1 - (at / zeros) ** 2)) / bessel0(beta);
  return at === 0 ? 1 : (window * Math.sin(Math.PI * at)) / (Math.PI * at);
});

/**
 * Value of a band-limited signal between its samples: a sinc under a Kaiser window (J. O. Smith, Digital audio
 * resampling). Beyond the recording's ends there is silence.
 *
 * @param bandwidth share of the band below half the sample rate that is kept, up to 1
 */
export function valueAt(samples: Float64Array, position: number, bandwidth = 1): number {
  const reach = zeros / bandwidth;
  const from = Math.max(0, Math.ceil(position - reach));
  const to = Math.min(samples.length - 1, Math.floor(position + reach));
  let sum = 0;
  for (let i = from; i <= to; i += 1) {
    const place = Math.abs(position - i) * bandwidth * stepsPerZero;
    const below = Math.floor(place);
    const weight = kernel[below] + (kernel[below + 1] - kernel[below]) * (place - below);
    sum += samples[i] * weight;
  }
  return sum * bandwidth;
}
