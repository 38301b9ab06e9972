import { limits, Refusal, showValue, type LevelSettings, type PointsSource } from '../contract/index.ts';

/** How a lamp's brightness changes from entry to entry. */
export const fadeShapes = ['linear', 'exponential', 'perceptual'] as const;
/** `up` and `down` run once from one end to the other; `there-and-back` is a loop that begins dark. */
export const fadeWays = ['up', 'down', 'there-and-back'] as const;

export interface FadeOptions {
  /**
   * `linear`: equal steps of luminance. `exponential`: equal ratios of luminance. `perceptual`: equal steps of CIE
   * 1976 lightness, by the definition's own transfer.
   */
  readonly shape: (typeof fadeShapes)[number];
  readonly way: (typeof fadeWays)[number];
  /** Highest to lowest luminance of an exponential fade, more than 1 and at most 10⁶; 100 where none is given. */
  readonly ratio?: number;
  /** Of the table, 2…65536 entries. */
  readonly length: number;
}

/** Parts of a definition for an unipolar table that is taken at the start of each entry, from phase 0. */
export interface Fade {
  readonly source: PointsSource;
  readonly level: LevelSettings;
}

const largestRatio = 1e6;

/**
 * A lamp's fade as a source of straight lines between points. Once through it begins with its first entry at one end
 * and ends with its last at the other; there and back it turns in the middle.
 *
 * A linear or perceptual fade is exact. An exponential one is exact up to 4096 entries, where each has a point of its
 * own; beyond, between points, it is too high by less than `(ln ratio/4095)²/8` of its value, there and back four
 * times that: less than a tenth of 16 bits' LSB at a ratio of 1000.
 *
 * @throws {Refusal} where the length or the ratio is out of range.
 */
export function fade({ shape, way, ratio = 100, length }: FadeOptions): Fade {
  const { min, max } = limits.tableLength;
  if (!Number.isInteger(length) || length < min || length > max) {
    refuse('table.length', length, `a whole number from ${min} to ${max}`);
  }
  if (!(ratio > 1 && ratio <= largestRatio)) {
    refuse('ratio', ratio, `a number above 1, up to ${largestRatio}`);
  }
  const places = placesOf(way, shape === 'exponential' ? length : 2, length);
  const points = places.map(({ x, u }) => ({ x, y: shape === 'exponential' ? ratio ** (u - 1) : u }));
  return {
    source: { kind: 'points', interpolation: 'linear', points, bandlimit: false },
    level: {
      removeMean: false,
      normalise: 'none',
      level: 1,
      transfer: shape === 'perceptual' ? 'cie-lightness' : 'none',
    },
  };
}

function refuse(path: string, value: unknown, allowed: string): never {
  throw new Refusal({ path, value: showValue(value), allowed });
}

/** A point's phase, and how far the fade has come there from dark (0) to bright (1). */
interface Place {
  readonly x: number;
  readonly u: number;
}

/**
 * As many places as are wanted and a source may have, evenly among the entries, where there are enough at each. A loop
 * closes by itself; what runs once has a place at its last entry.
 */
function placesOf(way: FadeOptions['way'], wanted: number, length: number): Place[] {
  const count = Math.min(wanted, limits.points.max);
  return Array.from({ length: count }, (_, i) => {
    if (way === 'there-and-back') return { x: i / count, u: 1 - Math.abs(1 - (2 * i) / count) };
    const x = count === length ? i / length : ((i / (count - 1)) * (length - 1)) / length;
    const come = i / (count - 1);
    return { x, u: way === 'up' ? come : 1 - come };
  });
}
