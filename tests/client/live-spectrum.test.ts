import { describe, expect, it } from 'vitest';
import { heardLevelDb, LiveSpectrumScene } from '../../src/features/bench/listen/live-spectrum-scene.ts';

const rateHz = 48_000;
const frames = 16_384;
const binHz = rateHz / frames;

/** A sine as the analyser shows it: the Blackman window of the Web Audio API, bins scaled by its mean 0.42. */
function spectrumOf(hz: number, amplitude: number): Float32Array<ArrayBuffer> {
  const levelsDb = new Float32Array(frames / 2).fill(-200);
  const place = hz / binHz;
  for (let k = Math.max(0, Math.round(place) - 8); k < Math.round(place) + 9; k += 1) {
    let re = 0;
    let im = 0;
    // Sums over 512 frames stand for those over 16,384: the window's transform depends on the distance in bins.
    const count = 512;
    for (let i = 0; i < count; i += 1) {
      const turn = (2 * Math.PI * i) / count;
      const window = 0.42 - 0.5 * Math.cos(turn) + 0.08 * Math.cos(2 * turn);
      re += (window * Math.cos((place - k) * turn)) / count;
      im += (window * Math.sin((place - k) * turn)) / count;
    }
    levelsDb[k] = 20 * Math.log10((amplitude * Math.hypot(re, im)) / 0.42);
  }
  return levelsDb;
}

/** With plain spaces, which those before units are not. */
const said = (scene: LiveSpectrumScene) => scene.summary().replace(/\s/g, ' ');

describe('the live spectrum', () => {
  it('reads a sine’s amplitude wherever it lies between two bins, within 0.01 dB', () => {
    for (const share of [0, 0.2, 0.5, 0.8]) {
      const hz = (150 + share) * binHz;
      const heard = { levelsDb: spectrumOf(hz, 0.1), binHz };
      expect(Math.abs(heardLevelDb(heard, hz) + 20)).toBeLessThan(0.01);
    }
  });

  it('tells the strongest predicted lines with what is heard of them', () => {
    const lines = [
      { hz: 440, amplitude: 0.1 },
      { hz: 880, amplitude: 0.01 },
    ];
    const predicted = { lines, limitHz: 24_000, whyNone: null };
    const scene = new LiveSpectrumScene({ heard: null, predicted }, true);
    expect(said(scene)).toBe(
      'Spectrum up to 24 kHz, nothing sounds. 2 predicted lines, the strongest: 440 Hz −20.0 dBFS; 880 Hz −40.0 dBFS.',
    );
    scene.set({ heard: { levelsDb: spectrumOf(440, 0.1), binHz }, predicted });
    expect(said(scene)).toContain(
      '440 Hz −20.0 dBFS, heard at −20.0 dBFS; 880 Hz −40.0 dBFS, heard at nothing',
    );
  });

  it('says why nothing is predicted', () => {
    const predicted = { lines: [], limitHz: 24_000, whyNone: 'One pass has no lines of its own to predict.' };
    expect(new LiveSpectrumScene({ heard: null, predicted }, false).summary()).toContain('One pass has no');
  });
});
