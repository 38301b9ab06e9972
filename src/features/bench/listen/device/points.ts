import {
  curveProblems,
  responseLimits,
  type ResponsePoint,
} from '../../../../../shared/listening/device-response.ts';

/** A point to add behind another: half-way to the next in octaves and dB, or an octave on with the same level. */
export function pointAfter(points: readonly ResponsePoint[], index: number): ResponsePoint {
  const here = points[index];
  const next = points[index + 1] as ResponsePoint | undefined;
  if (next !== undefined) {
    return { hz: tidy(Math.sqrt(here.hz * next.hz)), db: tidy((here.db + next.db) / 2) };
  }
  return { hz: Math.min(responseLimits.hz.max, 2 * here.hz), db: here.db };
}

const tidy = (value: number) => Number(value.toPrecision(4));

/** The points by rising frequency; null where that does not make a curve of them, or they are one. */
export function inOrder(points: readonly ResponsePoint[]): readonly ResponsePoint[] | null {
  const ordered = points.toSorted((one, other) => one.hz - other.hz);
  const isOther = ordered.some((point, index) => point !== points[index]);
  return isOther && curveProblems(ordered).length === 0 ? ordered : null;
}
