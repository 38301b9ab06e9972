import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import { centsBetween, nearestPitch, pitchHz } from '../../shared/playback/index.ts';

describe('pitches', () => {
  it('A4 is 440 Hz (ISO 16:1975), and its octaves exact doubles', () => {
    expect(pitchHz('A4')).toBe(440);
    for (let octave = -1; octave <= 10; octave += 1)
      expect(pitchHz(`A${octave}`)).toBe(440 * 2 ** (octave - 4));
  });

  it('a semitone is 2^(1/12), a hundred cents (common practice, no source)', () => {
    const scale = ['C4', 'C#4', 'D4', 'Eb4', 'E4', 'F4', 'F♯4', 'G4', 'A♭4', 'A4', 'Bb4', 'B4', 'C5'];
    scale.forEach((name, n) => {
      expect(pitchHz(name)).toBeCloseTo(440 * 2 ** ((n - 9) / 12), 10);
      if (n > 0) expect(centsBetween(pitchHz(name), pitchHz(scale[n - 1]))).toBeCloseTo(100, 9);
    });
  });

  it('go by more names than one, and by another tuning', () => {
    expect(pitchHz('c#5')).toBe(pitchHz('D♭5'));
    expect(pitchHz('B#3')).toBe(pitchHz('C4'));
    expect(pitchHz('Cb4')).toBe(pitchHz('B3'));
    expect(pitchHz('A4', 442)).toBe(442);
    expect(pitchHz('E5', 415)).toBeCloseTo(415 * 2 ** (7 / 12), 10);
  });

  it('nearest to a frequency comes back by its name, with the cents between', () => {
    for (let octave = 0; octave <= 9; octave += 1) {
      for (const name of ['C', 'C#', 'D', 'D#', 'E', 'F', 'F#', 'G', 'G#', 'A', 'A#', 'B']) {
        const hz = pitchHz(`${name}${octave}`);
        for (const cents of [-49, 0, 49]) {
          const near = nearestPitch(hz * 2 ** (cents / 1200));
          expect(near).toMatchObject({ name: `${name}${octave}`, hz });
          expect(near.cents).toBeCloseTo(cents, 9);
        }
      }
    }
  });

  it.each(['', 'H4', 'A', 'A11', 'A-2', 'A##4', '440', 'A4x'])('refuses %j', (name) => {
    expect(() => pitchHz(name)).toThrow(Refusal);
  });
});
