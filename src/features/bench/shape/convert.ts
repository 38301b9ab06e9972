import { linesOf } from '../../../../shared/dft/index.ts';
import type {
  HarmonicsSource,
  Partial,
  PointsSource,
  SamplesSource,
} from '../../../../shared/contract/index.ts';
import { closedCurve } from '../../../../shared/waveform/index.ts';

/** Points that a sum of partials is taken over at, and harmonics that a curve of points is taken over by. */
const pointsTaken = 16;
const samplesTaken = 64;
const harmonicsTaken = 32;
const curveSamples = 4_096;
/** Partials weaker than this beside the strongest are left behind: −60 dB. */
const leastKept = 1e-3;

const round = (value: number, digits: number) => Number(value.toFixed(digits)) + 0;

/** Values of a sum of partials at so many even places of the cycle. */
function valuesAlong({ offset, partials }: HarmonicsSource, count: number): number[] {
  return Array.from({ length: count }, (_, i) =>
    partials.reduce(
      (sum, { harmonic, amplitude, phaseDeg }) =>
        sum + amplitude * Math.sin(2 * Math.PI * ((harmonic * i) / count) + (phaseDeg * Math.PI) / 180),
      offset,
    ),
  );
}

/** A spline through evenly spaced points of the wave: a start for drawing on, not the same curve. */
export function pointsAlong(source: HarmonicsSource): PointsSource {
  const points = valuesAlong(source, pointsTaken).map((y, i) => ({ x: i / pointsTaken, y: round(y, 3) }));
  return { kind: 'points', interpolation: 'spline', points, bandlimit: false };
}

/** Samples of the wave at even places, enough for its low harmonics: a start for setting values. */
export function samplesAlong(source: HarmonicsSource | PointsSource): SamplesSource {
  const values =
    source.kind === 'harmonics'
      ? valuesAlong(source, samplesTaken)
      : Array.from({ length: samplesTaken }, (_, i) => closedCurve(source)(i / samplesTaken));
  return { kind: 'samples', resampling: 'bandlimited', values: values.map((value) => round(value, 6)) };
}

/** The lowest harmonics of a curve of points, as far as the table holds them: a start for going on with bars. */
export function harmonicsOf(source: PointsSource, highest: number): HarmonicsSource {
  const curve = closedCurve(source);
  return harmonicsOfCurve(
    Float64Array.from({ length: curveSamples }, (_, i) => curve(i / curveSamples)),
    highest,
  );
}

/** The same of one cycle's even samples. */
export function harmonicsOfCurve(samples: Float64Array, highest: number): HarmonicsSource {
  const count = samples.length;
  const { re, im } = linesOf(samples);
  const top = Math.max(1, Math.min(harmonicsTaken, highest));
  const all: Partial[] = [];
  for (let n = 1; n <= top; n += 1) {
    // X = A·N/2·e^(i(φ − 90°)) for A·sin(2πnt + φ).
    const phaseDeg = (Math.atan2(im[n], re[n]) * 180) / Math.PI + 90;
    all.push({
      harmonic: n,
      amplitude: round((2 * Math.hypot(re[n], im[n])) / count, 4),
      phaseDeg: round(phaseDeg > 180 ? phaseDeg - 360 : phaseDeg, 2),
    });
  }
  const strongest = Math.max(...all.map(({ amplitude }) => amplitude));
  const partials = all.filter(({ amplitude }) => amplitude > strongest * leastKept);
  return {
    kind: 'harmonics',
    offset: round(re[0] / count, 4),
    partials: partials.length > 0 ? partials : [{ harmonic: 1, amplitude: 0, phaseDeg: 0 }],
  };
}
