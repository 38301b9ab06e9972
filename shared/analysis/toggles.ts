import type { WorstToggle } from '../contract/index.ts';

/** Number of ones in each byte: those of its upper seven bits, and its last. */
const onesInByte = new Uint8Array(2 ** 8);
for (let byte = 1; byte < onesInByte.length; byte += 1) {
  onesInByte[byte] = onesInByte[byte >> 1] + (byte & 1);
}

/** Bits that change at each step of the loop, from entry k to k+1 and from the last to the first (§4). */
export function toggleFigures(codes: Uint16Array): { meanToggles: number; worstToggle: WorstToggle } {
  const count = codes.length;
  let total = 0;
  let worst = -1;
  let worstIndex = 0;
  let from = codes[0];
  for (let k = 0; k < count; k += 1) {
    const to = codes[k + 1 === count ? 0 : k + 1];
    const changed = from ^ to;
    const ones = onesInByte[changed >> 8] + onesInByte[changed & 0xff];
    total += ones;
    if (ones > worst) {
      worst = ones;
      worstIndex = k;
    }
    from = to;
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
