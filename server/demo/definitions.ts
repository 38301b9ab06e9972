import type { DefinitionInput, SourceInput } from '../../shared/contract/index.ts';

type Table = DefinitionInput['table'];

const define = (
  name: string,
  source: SourceInput,
  table: Table,
  level?: DefinitionInput['level'],
): DefinitionInput => ({ schema: 1, name, source, table, level });

/** Partials of a horn-like tone; amplitudes chosen by ear for this demonstration, no source. */
const horn = (...amplitudes: number[]): SourceInput => ({
  kind: 'harmonics',
  partials: amplitudes.map((amplitude, index) => ({ harmonic: index + 1, amplitude, phaseDeg: 0 })),
});

export const fogSignal = {
  first: define('Fog signal', horn(1, 0.5, 0.25), { length: 128, bits: 8 }),
  brighter: define('Fog signal', horn(1, 0.62, 0.4, 0.22, 0.1), { length: 256, bits: 8 }),
  quieter: define('Fog signal', horn(1, 0.62, 0.4, 0.22, 0.1), { length: 256, bits: 8 }, { level: 0.9 }),
};

export const answeringTone = {
  first: define('Fog signal answer', horn(1, 0, 0.33, 0, 0.2), { length: 256, bits: 8 }),
  finer: define('Fog signal answer', horn(1, 0, 0.33, 0, 0.2), { length: 256, bits: 10 }),
};

/** A tone that rises evenly from `from` to `to` cycles a table, faded in and out over an eighth of it. */
function chirp(length: number, from: number, to: number): SourceInput {
  const values = Array.from({ length }, (_, k) => {
    const t = k / length;
    const phase = from * t + ((to - from) * t * t) / 2;
    const fade = Math.min(1, 8 * t, 8 * (1 - t));
    return Math.round(1e6 * fade * Math.sin(2 * Math.PI * phase)) / 1e6;
  });
  return { kind: 'samples', values, resampling: 'hold' };
}

export const lowBatteryChirp = {
  long: define('Low battery chirp', chirp(1024, 24, 72), { length: 1024, bits: 8 }),
  short: define('Low battery chirp', chirp(512, 16, 44), { length: 512, bits: 6 }),
};

const swell: SourceInput = {
  kind: 'points',
  interpolation: 'monotone',
  points: [
    { x: 0, y: 0 },
    { x: 0.4, y: 0.9 },
    { x: 0.5, y: 1 },
    { x: 0.6, y: 0.9 },
  ],
};

export const lampFade = {
  plain: define('Lamp fade', swell, { length: 128, bits: 8, range: 'unipolar' }, { normalise: 'span' }),
  even: define(
    'Lamp fade',
    swell,
    { length: 256, bits: 10, range: 'unipolar' },
    { normalise: 'span', transfer: 'cie-lightness' },
  ),
};

const sine: SourceInput = { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] };

export const selfTestSine = {
  first: define('Self test sine', sine, { length: 64, bits: 8 }),
  centred: define('Self test sine', sine, { length: 64, bits: 12, sampleAt: 'centre' }),
};
