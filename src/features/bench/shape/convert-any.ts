import type { Source } from '../../../../shared/contract/index.ts';
import { asMix } from './as-mix.ts';
import { harmonicsOfCurve, pointsAlong, samplesAlong } from './convert.ts';
import { curveOf } from './curve-of.ts';
import { shapeSource } from './starts.ts';

const pointsTaken = 16;
const samplesTaken = 64;
const curveTaken = 4_096;

const round = (value: number) => Number(value.toFixed(6)) + 0;

/** A source of another kind to go on with, along the present curve as far as that can be computed. */
export function sourceOfKind(
  kind: Source['kind'],
  now: Source,
  highestFitting: number,
  isSound: boolean,
): Source {
  if (kind === now.kind) return now;
  if (kind === 'mix') return asMix(now);
  const curve = isSound ? curveOf(now, curveTaken) : null;
  const sine = shapeSource('sine', { highest: 1, duty: 0.5 });
  switch (kind) {
    case 'harmonics':
      return curve === null ? sine : harmonicsOfCurve(curve, highestFitting);
    case 'points':
      if (curve === null || now.kind === 'harmonics')
        return pointsAlong(now.kind === 'harmonics' ? now : sine);
      return {
        kind: 'points',
        interpolation: 'spline',
        points: takenFrom(curve, pointsTaken).map((y, index) => ({ x: index / pointsTaken, y })),
        bandlimit: false,
      };
    case 'samples':
      if (now.kind === 'harmonics' || (now.kind === 'points' && isSound)) return samplesAlong(now);
      return curve === null
        ? samplesAlong(sine)
        : { kind: 'samples', resampling: 'bandlimited', values: takenFrom(curve, samplesTaken) };
  }
}

function takenFrom(curve: Float64Array, count: number): number[] {
  return Array.from({ length: count }, (_, index) => round(curve[(index * curve.length) / count]));
}
