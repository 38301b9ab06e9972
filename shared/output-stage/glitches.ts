export interface Glitch {
  /** Entry from which the step goes on to the next, the last to the first. */
  readonly index: number;
  readonly from: number;
  readonly to: number;
  /** The code that stands between them. */
  readonly through: number;
  /** How far its level lies outside those of the two, in V: above positive, below negative. */
  readonly excursionVolts: number;
  /** Excursion times the skew, in V·s, signed as the excursion. */
  readonly areaVs: number;
}

export interface Glitches {
  /** Area of each step of the loop, in V·s; 0 where the level between lies between. */
  readonly areas: Float64Array;
  /** The steps of the largest areas, largest first, lowest index first among equals; those without left out. */
  readonly largest: readonly Glitch[];
}

/**
 * What a loop puts out while some bits have changed and others have not (engine specification §6). Rising edges that
 * come later leave `old & new` standing, those that come earlier `old | new`.
 *
 * @param volts level of each code
 * @param edgeSkewS how much later rising edges come than falling ones, in s; below 0 earlier
 * @param listed how many steps to list
 */
export function glitchesOf(
  volts: ArrayLike<number>,
  codes: ArrayLike<number>,
  edgeSkewS: number,
  listed = 10,
): Glitches {
  const size = codes.length;
  const areas = new Float64Array(size);
  const glitchAt = (index: number): Glitch => {
    const from = codes[index];
    const to = codes[index + 1 === size ? 0 : index + 1];
    const through = edgeSkewS >= 0 ? from & to : from | to;
    const low = Math.min(volts[from], volts[to]);
    const high = Math.max(volts[from], volts[to]);
    const level = volts[through];
    const excursionVolts = level > high ? level - high : level < low ? level - low : 0;
    return { index, from, to, through, excursionVolts, areaVs: excursionVolts * Math.abs(edgeSkewS) };
  };
  for (let index = 0; index < size; index += 1) areas[index] = glitchAt(index).areaVs;
  const order = Uint32Array.from(areas, (_, index) => index).filter((index) => areas[index] !== 0);
  order.sort((a, b) => Math.abs(areas[b]) - Math.abs(areas[a]) || a - b);
  return { areas, largest: Array.from(order.subarray(0, listed), glitchAt) };
}
