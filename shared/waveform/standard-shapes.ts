import type { HarmonicsSource, Partial } from '../contract/index.ts';

// Fourier series of the CRC Standard Mathematical Tables, each to harmonics 1…`partials`.

function series(
  partials: number,
  offset: number,
  term: (n: number) => Omit<Partial, 'harmonic'> | null,
): HarmonicsSource {
  const terms: Partial[] = [];
  for (let n = 1; n <= partials; n += 1) {
    const part = term(n);
    if (part !== null) terms.push({ harmonic: n, ...part });
  }
  return { kind: 'harmonics', offset, partials: terms };
}

const sinePart = (amplitude: number) => ({ amplitude, phaseDeg: 0 });

/** A single sine of amplitude 1. */
export function sine(): HarmonicsSource {
  return series(1, 0, () => sinePart(1));
}

/** Triangle from 0 rising: `8/(π²n²)·(−1)^((n−1)/2)`, odd n. @param partials highest harmonic, ≥ 1 */
export function triangle(partials: number): HarmonicsSource {
  return series(partials, 0, (n) =>
    n % 2 === 0 ? null : sinePart(((n % 4 === 1 ? 1 : -1) * 8) / (Math.PI * n) ** 2),
  );
}

/** Rising sawtooth through 0 at t = 0: `(2/π)(−1)^(n+1)/n`. @param partials highest harmonic, ≥ 1 */
export function sawtooth(partials: number): HarmonicsSource {
  return series(partials, 0, (n) => sinePart(((n % 2 === 1 ? 1 : -1) * 2) / (Math.PI * n)));
}

/** Square, high in the first half: `4/(πn)`, odd n. @param partials highest harmonic, ≥ 1 */
export function square(partials: number): HarmonicsSource {
  return series(partials, 0, (n) => (n % 2 === 0 ? null : sinePart(4 / (Math.PI * n))));
}

/**
 * Pulse of levels ±1, high for `0 ≤ t < duty`: mean `2d − 1`, harmonic n
 * `(4/(nπ))·sin(πnd)·cos(2πn(t − d/2))`.
 *
 * @param partials highest harmonic, ≥ 1
 * @param duty share of the cycle that is high, 0 < duty < 1
 */
export function pulse(partials: number, duty: number): HarmonicsSource {
  return series(partials, 2 * duty - 1, (n) => ({
    amplitude: (4 / (n * Math.PI)) * Math.sin(Math.PI * n * duty),
    phaseDeg: 90 - 180 * n * duty,
  }));
}
