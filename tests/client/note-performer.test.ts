import { describe, expect, it } from 'vitest';
import {
  NotePerformer,
  silence,
  type NoteSettings,
} from '../../src/features/bench/listen/keys/note-performer.ts';
import type { Score } from '../../shared/listening/sound.ts';

const free: NoteSettings = {
  drive: { kind: 'rate', tableLength: 64, cycles: 1 },
  a4Hz: 440,
  portamentoMs: 0,
};
const byWord: NoteSettings = {
  drive: { kind: 'accumulator', accumulatorBits: 16, sampleRateHz: 32_768, cycles: 1 },
  a4Hz: 440,
  portamentoMs: 0,
};

function performing(settings: NoteSettings) {
  const scores: Score[] = [];
  const clock = { ms: 0 };
  const performer = new NotePerformer(settings, 69, () => clock.ms);
  performer.tell((score) => scores.push(score));
  return { performer, scores, clock, now: () => performer.state.now() };
}

const noteOn = (setting: { toneHz: number } | { stepWord: number }) => ({
  events: [{ atSeconds: 0, gate: true, ...setting }],
});

describe('the performer of notes', () => {
  it('plays one tone at a time, and goes back to what is still held', () => {
    const { performer, scores, now } = performing(byWord);
    expect(performer.score).toBe(silence);
    performer.press('a', 69);
    performer.press('b', 81);
    expect(now().sounding).toBe(81);
    performer.release('b');
    expect(now()).toMatchObject({ sounding: 69, atHand: 69 });
    performer.release('a');
    // A word is half a hertz; the pitch stays while the gate closes.
    expect(scores).toEqual([
      noteOn({ stepWord: 880 }),
      noteOn({ stepWord: 1760 }),
      noteOn({ stepWord: 880 }),
      { events: [{ atSeconds: 0, gate: false, stepWord: 880 }] },
    ]);
    expect(performer.score).toBe(scores[3]);
    expect(now().sounding).toBeNull();
  });

  it('says nothing anew where the sounding note does not change', () => {
    const { performer, scores } = performing(free);
    performer.press('a', 60);
    performer.press('b', 69);
    performer.press('c', 69);
    performer.release('a');
    performer.release('b');
    performer.release('nobody');
    expect(scores).toHaveLength(2);
  });

  it('glides from what sounds at that moment, and only while a note is held', () => {
    const { performer, scores, clock } = performing({ ...free, portamentoMs: 100 });
    performer.press('a', 69);
    expect(scores.at(-1)).toEqual(noteOn({ toneHz: 440 }));
    clock.ms = 1000;
    performer.press('a', 81);
    const whole = scores.at(-1)?.events ?? [];
    expect(whole).toHaveLength(101);
    expect(whole[0]).toEqual({ atSeconds: 0, gate: true, toneHz: 440 });
    expect(whole[50].toneHz).toBeCloseTo(440 * Math.SQRT2, 9);
    expect(whole[100]).toEqual({ atSeconds: 0.1, toneHz: 880 });
    // Half way up, back again.
    clock.ms = 1050.5;
    performer.press('a', 69);
    const back = scores.at(-1)?.events ?? [];
    expect(back[0].toneHz).toBeCloseTo(440 * Math.SQRT2, 9);
    expect(back.at(-1)?.toneHz).toBe(440);
    performer.releaseAll();
    performer.press('a', 57);
    expect(scores.at(-1)).toEqual(noteOn({ toneHz: 220 }));
  });

  it('bends what sounds at once, and what comes after', () => {
    const { performer, scores, now } = performing({ ...free, portamentoMs: 100 });
    performer.bend(2);
    expect(scores).toEqual([]);
    performer.press('a', 67);
    expect(scores[0].events[0].toneHz).toBeCloseTo(440, 9);
    performer.bend(-2);
    expect(scores[1].events).toHaveLength(1);
    expect(scores[1].events[0].toneHz).toBeCloseTo(440 * 2 ** (-4 / 12), 9);
    expect(now().bend).toBe(-2);
  });

  it('goes over to another tuning or way of making notes with what is held', () => {
    const { performer, scores } = performing(free);
    performer.press('a', 69);
    performer.set({ ...free, a4Hz: 442 });
    performer.set({ ...byWord, a4Hz: 442 });
    performer.set({ ...byWord, a4Hz: 442, portamentoMs: 5 });
    expect(scores.slice(1)).toEqual([noteOn({ toneHz: 442 }), noteOn({ stepWord: 884 })]);
  });

  it('says why a note is not played, and keeps what sounds', () => {
    const { performer, scores, now } = performing({
      ...byWord,
      drive: { kind: 'accumulator', accumulatorBits: 16, sampleRateHz: 8_000, cycles: 1 },
    });
    performer.press('a', 69);
    expect(performer.press('b', 108)).toBe(false);
    expect(now()).toMatchObject({ sounding: 69, atHand: 108 });
    expect(now().fault).toMatch(
      /^C8 is not played\. 4186\.009 Hz is out of reach\. Allowed: a frequency from .* Hz\.$/,
    );
    expect(scores).toHaveLength(1);
    // What the bend takes out of reach falls silent.
    performer.press('c', 107);
    performer.bend(2);
    expect(now()).toMatchObject({ sounding: null, held: [] });
    expect(now().fault).toMatch(/^B7 is not played/);
    expect(scores.at(-1)?.events[0].gate).toBe(false);
  });

  it('a score of its own lets all notes go', () => {
    const { performer, scores, now } = performing(free);
    performer.press('a', 69);
    const own: Score = { events: [{ atSeconds: 0, gate: true, toneHz: 100 }] };
    performer.perform(own);
    expect(now().held).toEqual([]);
    performer.release('a');
    expect(scores.at(-1)).toBe(own);
    performer.forget();
    expect(performer.score).toBe(silence);
    expect(scores.at(-1)).toBe(own);
  });
});
