import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';

/** Numbers from 0 up to, not including, 1; the same ones for the same seed. */
export type Random = () => number;

export function randomFrom(seed: string): Random {
  let state = 0;
  for (let k = 0; k < seed.length; k += 1) state = (Math.imul(state, 31) + seed.charCodeAt(k)) | 0;
  const generator = xoroshiro128plus(state);
  return () => (generator.next() >>> 0) / 2 ** 32;
}

export const pick = <Item>(random: Random, items: readonly Item[]): Item =>
  items[Math.floor(random() * items.length)];

/** An item of a list, the k-th about 1/k as often as the first, as words of a language are (Zipf 1935). */
export function pickByRank<Item>(random: Random, items: readonly Item[]): Item {
  const rank = Math.floor(Math.exp(random() * Math.log(items.length + 1)) - 1);
  return items[Math.min(items.length - 1, rank)];
}
