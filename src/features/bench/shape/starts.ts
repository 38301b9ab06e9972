import {
  limits,
  type HarmonicsSource,
  type Point,
  type PointsSource,
} from '../../../../shared/contract/index.ts';
import { standardShapes } from '../../../../shared/waveform/index.ts';

export const shapes = ['sine', 'triangle', 'sawtooth', 'square', 'pulse'] as const;
export type Shape = (typeof shapes)[number];

export interface ShapeOptions {
  /** Highest harmonic of the series, 1…32768. */
  readonly highest: number;
  /** Share of the cycle that a pulse is high, 0 < duty < 1. */
  readonly duty: number;
}

/** Partials that a series to a harmonic has, and with it the highest harmonic that a wave has room for. */
const isOddOnly = (shape: Shape) => shape === 'triangle' || shape === 'square';

/** The highest harmonic up to which a shape's series stays within the most partials that a wave can hold. */
export function highestHeld(shape: Shape): number {
  return isOddOnly(shape) ? 2 * limits.partials.max : limits.partials.max;
}

/** A sine or cosine of a multiple of π that should be 0 comes out as some 10⁻¹⁶; no term of a series is so small. */
const leastTerm = 1e-12;

/** A standard shape by its Fourier series, as far up as asked and as a wave has room for; terms of 0 are left out. */
export function shapeSource(shape: Shape, { highest, duty }: ShapeOptions): HarmonicsSource {
  const top = Math.max(1, Math.min(highest, highestHeld(shape)));
  const whole = seriesOf(shape, top, duty);
  return { ...whole, partials: whole.partials.filter(({ amplitude }) => Math.abs(amplitude) > leastTerm) };
}

function seriesOf(shape: Shape, top: number, duty: number): HarmonicsSource {
  switch (shape) {
    case 'sine':
      return standardShapes.sine();
    case 'pulse':
      return standardShapes.pulse(top, duty);
    default:
      return standardShapes[shape](top);
  }
}

/** Whether two waves are the same partials in the same order. */
export function sameHarmonics(one: HarmonicsSource, other: HarmonicsSource): boolean {
  return (
    one === other ||
    (one.offset === other.offset &&
      one.partials.length === other.partials.length &&
      one.partials.every((partial, index) => {
        const { harmonic, amplitude, phaseDeg } = other.partials[index];
        return (
          partial.harmonic === harmonic && partial.amplitude === amplitude && partial.phaseDeg === phaseDeg
        );
      }))
  );
}

export const pointStarts = ['ramp', 'step', 'trapezoid', 'fade'] as const;
export type PointStart = (typeof pointStarts)[number];

export interface TableFrame {
  readonly range: 'bipolar' | 'unipolar';
  readonly tableLength: number;
  readonly cycles: number;
}

/** Points to start from, over the whole of the range. */
export function pointsStart(start: PointStart, { range, tableLength, cycles }: TableFrame): PointsSource {
  const low = range === 'unipolar' ? 0 : -1;
  const source = (interpolation: PointsSource['interpolation'], points: Point[]): PointsSource => ({
    kind: 'points',
    interpolation,
    points,
    bandlimit: false,
  });
  switch (start) {
    case 'ramp': {
      // The top on the last entry of a cycle, so that the fall takes one step of the table and no entry lies on it.
      const last = tableLength > 2 * cycles && cycles >= 1 ? 1 - cycles / tableLength : 0.99;
      return source('linear', [
        { x: 0, y: low },
        { x: Number(last.toFixed(6)), y: 1 },
      ]);
    }
    case 'step':
      return source('step', [
        { x: 0, y: low },
        { x: 0.5, y: 1 },
      ]);
    case 'trapezoid':
      return source('linear', [
        { x: 0, y: low },
        { x: 0.25, y: 1 },
        { x: 0.5, y: 1 },
        { x: 0.75, y: low },
      ]);
    case 'fade':
      return source('monotone', [
        { x: 0, y: low },
        { x: 0.4, y: 1 },
        { x: 0.5, y: 1 },
        { x: 0.9, y: low },
      ]);
  }
}
