import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import type { Ladder, TrialSettings } from '../contract/index.ts';
import { resistorsOf, type Resistors } from './resistors.ts';

/** Builds of one ladder by chance, one after another. */
export interface Draws {
  /** Fills the resistors of the next build. The same object each time, valid until the next call. */
  readonly next: () => Resistors;
}

/**
 * Resistors about those of a ladder: rungs first, least significant bit first, then series, then the terminator.
 * Uniform within ± tolerance; or normal with the tolerance at 3σ, not truncated.
 *
 * Drawn in order from xoroshiro128+ (the `pure-rand` package), 32 bits a draw, each taken at the middle of its
 * step. Uniform takes one draw a resistor; normal takes two, `√(−2·ln u₁)·cos(2π·u₂)` (Box & Muller 1958).
 */
export function drawsOf(
  ladder: Ladder,
  { seed, tolerancePercent, distribution }: Pick<TrialSettings, 'seed' | 'tolerancePercent' | 'distribution'>,
): Draws {
  const nominal = resistorsOf(ladder);
  const { bits } = ladder;
  const generator = xoroshiro128plus(seed);
  const share = tolerancePercent / 100;
  const draw = () => ((generator.next() >>> 0) + 0.5) / 2 ** 32;
  const uniform = () => 1 + share * (2 * draw() - 1);
  const normal = () => {
    const radius = Math.sqrt(-2 * Math.log(draw()));
    return 1 + (share / 3) * radius * Math.cos(2 * Math.PI * draw());
  };
  const factor = distribution === 'normal' ? normal : uniform;
  const build = { rungs: new Float64Array(bits), series: new Float64Array(bits - 1), terminator: 0 };
  return {
    next: () => {
      for (let bit = 0; bit < bits; bit += 1) build.rungs[bit] = nominal.rungs[bit] * factor();
      for (let node = 0; node < bits - 1; node += 1) build.series[node] = nominal.series[node] * factor();
      build.terminator = nominal.terminator * factor();
      return build;
    },
  };
}
