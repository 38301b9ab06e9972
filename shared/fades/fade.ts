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
 * times that: never as much as a quarter of 16 bits' LSB at a ratio of 1000.
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
  const corners = cornersOf(way, length);
  const points = shape === 'exponential' ? exponentialPoints(corners, ratio, length) : corners;
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

interface Corner {
  readonly x: number;
  readonly y: number;
}

/** Where the straight fade turns: at the phases of its first and last entry, or in the middle. */
function cornersOf(way: FadeOptions['way'], length: number): Corner[] {
  if (way === 'there-and-back') {
    return [
      { x: 0, y: 0 },
      { x: 0.5, y: 1 },
    ];
  }
  const dark = way === 'up' ? 0 : 1;
  return [
    { x: 0, y: dark },
    { x: (length - 1) / length, y: 1 - dark },
  ];
}

/** Points of `ratio^(u − 1)`, u the straight fade from 0 to 1, at the entries or evenly among them. */
function exponentialPoints([first, last]: readonly Corner[], ratio: number, length: number): Corner[] {
  const isLoop = last.x === 0.5;
  // A loop closes by itself; what runs once needs a point at its last entry.
  const steps = isLoop ? Math.min(length, limits.points.max) : Math.min(length, limits.points.max) - 1;
  const end = isLoop ? 1 : last.x;
  return Array.from({ length: isLoop ? steps : steps + 1 }, (_, i) => {
    const x = steps + 1 === length && !isLoop ? i / length : (i * end) / steps;
    const turned = isLoop && x > last.x ? 1 - x : x;
    const u = first.y + ((last.y - first.y) * turned) / last.x;
    return { x, y: ratio ** (u - 1) };
  });
}
