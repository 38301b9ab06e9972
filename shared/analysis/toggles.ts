import type { WorstToggle } from '../contract/index.ts';

/** Number of ones in a word of 16 bits, by sums over growing fields. */
function onesIn(word: number): number {
  let sum = word - ((word >> 1) & 0x5555);
  sum = (sum & 0x3333) + ((sum >> 2) & 0x3333);
  sum = (sum + (sum >> 4)) & 0x0f0f;
  return (sum + (sum >> 8)) & 0x1f;
}

/** Bits that change at each step of the loop, from entry k to k+1 and from the last to the first (§4). */
export function toggleFigures(codes: Uint16Array): { meanToggles: number; worstToggle: WorstToggle } {
  const count = codes.length;
  let total = 0;
  let worst = -1;
  let worstIndex = 0;
  for (let k = 0; k < count; k += 1) {
    const ones = onesIn(codes[k] ^ codes[k + 1 === count ? 0 : k + 1]);
    total += ones;
    if (ones > worst) {
      worst = ones;
      worstIndex = k;
    }
  }
  return {
    meanToggles: total / count,
    worstToggle: {
      bits: worst,
      index: worstIndex,
      from: codes[worstIndex],
      to: codes[(worstIndex + 1) % count],
    },
  };
}
