import { parseDefinition, type DefinitionInput } from '../../../../shared/contract/index.ts';
import type { Playback, Work } from './wave.ts';

/** A wave to start from, out of the demo team's work on buoys. */
export interface Example {
  readonly id: string;
  readonly title: string;
  /** What it is for, in one line. */
  readonly summary: string;
  readonly work: Work;
}

function example(
  id: string,
  summary: string,
  input: Omit<DefinitionInput, 'schema'>,
  playback: Playback,
): Example {
  const definition = parseDefinition({ schema: 1, ...input });
  return {
    id,
    title: input.name,
    summary,
    work: { definition, playback, exporting: { target: 'c99', options: {} } },
  };
}

/** Swings of the chirp, each shorter and higher in pitch than the one before: where they turn, and how far. */
const chirpTurns = [
  [0, 0], [0.045, 0.55], [0.13, -0.85], [0.21, 1], [0.285, -1], [0.355, 1], [0.42, -1], [0.48, 1], [0.535, -1],
  [0.587, 1], [0.636, -1], [0.683, 0.98], [0.728, -0.95], [0.771, 0.9], [0.813, -0.82], [0.854, 0.7], [0.894, -0.5],
  [0.934, 0.25], [0.97, -0.08],
].map(([x, y]) => ({ x, y })); // prettier-ignore

/** The first stands on the bench at the first visit. */
export const examples: readonly [Example, ...Example[]] = [
  example(
    'fog-signal',
    'Five partials, 256 entries of 8 bits, heard as a loop',
    {
      name: 'Fog-signal tone',
      source: {
        kind: 'harmonics',
        partials: [
          { harmonic: 1, amplitude: 1, phaseDeg: 0 },
          { harmonic: 2, amplitude: 0.62, phaseDeg: 90 },
          { harmonic: 3, amplitude: 0.44, phaseDeg: 30 },
          { harmonic: 5, amplitude: 0.27, phaseDeg: 90 },
          { harmonic: 8, amplitude: 0.12, phaseDeg: 180 },
        ],
      },
      table: { length: 256, bits: 8 },
    },
    { mode: 'loop', by: 'tone', toneHz: 220, sampleRateHz: 32_000 },
  ),
  example(
    'low-battery',
    'A rising chirp drawn by points, played once through',
    {
      name: 'Low-battery chirp',
      source: { kind: 'points', interpolation: 'spline', points: chirpTurns },
      table: { length: 2_048, bits: 8 },
    },
    { mode: 'once', by: 'sampleRate', toneHz: 8, sampleRateHz: 16_000 },
  ),
  example(
    'lamp-fade',
    'Unipolar duty values for a lamp, corrected for the eye',
    {
      name: 'Lamp fade',
      source: {
        kind: 'points',
        interpolation: 'monotone',
        points: [
          { x: 0, y: 0 },
          { x: 0.35, y: 1 },
          { x: 0.55, y: 1 },
          { x: 0.9, y: 0 },
        ],
      },
      level: { normalise: 'none', transfer: 'cie-lightness' },
      table: { length: 180, bits: 10, range: 'unipolar' },
    },
    { mode: 'loop', by: 'sampleRate', toneHz: 0.25, sampleRateHz: 45 },
  ),
  example(
    'self-test',
    'One sine for checking an output, symmetrical about zero',
    {
      name: 'Self-test sine',
      source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
      table: { length: 128, bits: 10, sampleAt: 'centre', rounding: 'half-even' },
    },
    { mode: 'loop', by: 'tone', toneHz: 1_000, sampleRateHz: 128_000 },
  ),
];
