import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import { limits, type HarmonicsSource, type Partial } from '../../shared/contract/index.ts';
import { synthesise } from '../../shared/waveform/index.ts';
import { parseDefinition } from '../../shared/contract/index.ts';
import { actOfKey } from '../../src/features/bench/shape/bar-keys.ts';
import { addStep, ceilingFor, labelEvery, snapToGrid } from '../../src/features/bench/shape/bar-scale.ts';
import {
  addPartial,
  drawBars,
  highestFitting,
  isInOrder,
  mergeDoubles,
  putInOrder,
  removeBar,
  setBar,
} from '../../src/features/bench/shape/bars.ts';

const partial = (harmonic: number, amplitude: number, phaseDeg = 0): Partial => ({
  harmonic,
  amplitude,
  phaseDeg,
});
const wave = (...partials: Partial[]): HarmonicsSource => ({ kind: 'harmonics', offset: 0.1, partials });
const heights = (source: HarmonicsSource) =>
  Object.fromEntries(source.partials.map(({ harmonic, amplitude }) => [harmonic, amplitude]));

const anyWave = fc
  .array(
    fc.record({
      harmonic: fc.integer({ min: 1, max: 24 }),
      amplitude: fc.integer({ min: -200, max: 200 }).map((hundredths) => hundredths / 100),
      phaseDeg: fc.integer({ min: -180, max: 180 }),
    }),
    { minLength: 1, maxLength: 12 },
  )
  .map((partials) => wave(...partials));

describe('a stroke over the bars', () => {
  test('sets every bar on the way to the line between its ends, whichever way it goes', () => {
    const drawn = drawBars(
      wave(partial(1, 1)),
      { harmonic: 2, amplitude: 0.8 },
      { harmonic: 6, amplitude: 0 },
    );
    expect(heights(drawn)).toEqual({ 1: 1, 2: 0.8, 3: 0.6, 4: 0.4, 5: 0.2 });
    const back = drawBars(
      wave(partial(1, 1)),
      { harmonic: 6, amplitude: 0.5 },
      { harmonic: 2, amplitude: -0.3 },
    );
    expect(heights(back)).toEqual({ 1: 1, 2: -0.3, 3: -0.1, 4: 0.1, 5: 0.3, 6: 0.5 });
  });

  test('a bar drawn to 0 keeps its partial and its phase; one that had none gets none', () => {
    const drawn = drawBars(
      wave(partial(1, 1), partial(3, 0.5, 90)),
      { harmonic: 2, amplitude: 0 },
      { harmonic: 4, amplitude: 0 },
    );
    expect(drawn.partials).toEqual([partial(1, 1), partial(3, 0, 90)]);
  });

  test('a stroke on one bar ends at the pointer’s last height', () => {
    expect(
      heights(
        drawBars(wave(partial(1, 1)), { harmonic: 1, amplitude: 0.2 }, { harmonic: 1, amplitude: 0.7 }),
      ),
    ).toEqual({ 1: 0.7 });
  });

  test('a stroke that changes nothing gives the same source back', () => {
    const source = wave(partial(1, 1), partial(2, 0.5));
    expect(drawBars(source, { harmonic: 2, amplitude: 0.5 }, { harmonic: 2, amplitude: 0.5 })).toBe(source);
  });

  test('what is not under the stroke stays as it was, and a list in order stays in order', () => {
    fc.assert(
      fc.property(
        anyWave,
        fc.integer({ min: 1, max: 30 }),
        fc.integer({ min: 1, max: 30 }),
        fc.integer({ min: -100, max: 100 }),
        fc.integer({ min: -100, max: 100 }),
        (source, first, last, from, to) => {
          const before = putInOrder(source);
          const drawn = drawBars(
            before,
            { harmonic: first, amplitude: from / 100 },
            { harmonic: last, amplitude: to / 100 },
          );
          expect(isInOrder(drawn.partials)).toBe(true);
          const isUnder = (harmonic: number) =>
            harmonic >= Math.min(first, last) && harmonic <= Math.max(first, last);
          const apart = ({ partials }: HarmonicsSource) =>
            partials.filter(({ harmonic }) => !isUnder(harmonic));
          expect(apart(drawn)).toEqual(apart(before));
          const end = drawn.partials.find(({ harmonic }) => harmonic === last);
          expect(end?.amplitude ?? 0).toBeCloseTo(to / 100, 12);
          expect(drawn.partials.map(({ phaseDeg }) => phaseDeg)).toEqual(
            expect.arrayContaining(before.partials.map(({ phaseDeg }) => phaseDeg)),
          );
        },
      ),
      { seed: 11, numRuns: 300 },
    );
  });

  test('no more partials are added than a wave can hold', () => {
    const full = wave(...Array.from({ length: limits.partials.max }, (_, i) => partial(i + 1, 0.1)));
    const drawn = drawBars(full, { harmonic: 4_090, amplitude: 0.5 }, { harmonic: 4_110, amplitude: 0.5 });
    expect(drawn.partials).toHaveLength(limits.partials.max);
    expect(drawn.partials[4_089].amplitude).toBe(0.5);
  });
});

describe('removing and adding', () => {
  test('the last partial stays and falls to 0', () => {
    expect(removeBar(wave(partial(4, 0.3, 45)), 4).partials).toEqual([partial(4, 0, 45)]);
    expect(removeBar(wave(partial(4, 0.3), partial(5, 1)), 4).partials).toEqual([partial(5, 1)]);
  });

  test('a new partial takes the lowest harmonic that is free', () => {
    expect(addPartial(wave(partial(1, 1), partial(3, 1))).partials.at(-1)).toEqual(partial(2, 0));
  });

  test('partials of one harmonic add to the same wave', () => {
    fc.assert(
      fc.property(anyWave, (source) => {
        const merged = mergeDoubles(source);
        expect(new Set(merged.partials.map(({ harmonic }) => harmonic)).size).toBe(merged.partials.length);
        const cycleOf = (one: HarmonicsSource) =>
          synthesise(parseDefinition({ schema: 1, name: 'a', source: one })).cycle;
        const [before, after] = [cycleOf(source), cycleOf(merged)];
        before.forEach((value, k) => expect(after[k]).toBeCloseTo(value, 9));
      }),
      { seed: 5, numRuns: 40 },
    );
  });
});

describe('what fits the table', () => {
  test('the highest harmonic obeys 2nK < N, and the next one does not', () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 65_536 }), fc.integer({ min: 1, max: 64 }), (length, cycles) => {
        const highest = highestFitting(length, cycles);
        expect(highest === 0 || 2 * highest * cycles < length).toBe(true);
        expect(2 * (highest + 1) * cycles >= length).toBe(true);
      }),
    );
  });
});

describe('the scale of the field', () => {
  test('the top is a round number that no bar passes, and 1 where all are small', () => {
    expect([0, 0.2, 1, 1.2, 4.1, 7.6, 31].map((strongest) => ceilingFor(strongest, 'all'))).toEqual([
      1, 1, 1, 1.5, 5, 10, 50,
    ]);
    expect(ceilingFor(3, '0.1')).toBe(0.1);
    fc.assert(
      fc.property(fc.double({ min: 0, max: 1e6, noNaN: true }), (strongest) => {
        expect(ceilingFor(strongest, 'all')).toBeGreaterThanOrEqual(strongest);
      }),
    );
  });

  test('drawn heights are hundredths of the top and stay inside', () => {
    expect(snapToGrid(0.3333, 1)).toBe(0.33);
    expect(snapToGrid(1.7, 1.5)).toBe(1.5);
    expect(snapToGrid(-0.0004, 1)).toBe(0);
    expect(Object.is(snapToGrid(-0.0004, 1), 0)).toBe(true);
    expect(snapToGrid(0.01234, 0.03)).toBe(0.0123);
  });

  test('steps stay on their decimal grid', () => {
    expect(addStep(0.1, 0.2)).toBe(0.3);
    expect(addStep(0.01, -0.01)).toBe(0);
    expect(addStep(0.123, 0.1)).toBe(0.223);
  });

  test('numbers under the bars stand at least 22 px apart', () => {
    for (const pitch of [22, 20, 10.9, 5.4, 5]) expect(labelEvery(pitch) * pitch).toBeGreaterThanOrEqual(22);
    expect(labelEvery(22)).toBe(1);
    expect(labelEvery(5)).toBe(5);
  });
});

describe('keys on a bar', () => {
  const source = wave(partial(1, 1), partial(3, 0.25, 90));
  const at = { source, harmonic: 3, amplitude: 0.25, shown: 16 };
  const press = (key: string, shiftKey = false, over: object = {}) =>
    actOfKey({ key, shiftKey }, { ...at, ...over });

  test('left, right, Home and End walk and stop at the ends', () => {
    expect(press('ArrowLeft')).toEqual({ kind: 'go', harmonic: 2 });
    expect(press('ArrowLeft', false, { harmonic: 1 })).toEqual({ kind: 'go', harmonic: 1 });
    expect(press('ArrowRight', false, { harmonic: 16 })).toEqual({ kind: 'go', harmonic: 16 });
    expect(press('Home')).toEqual({ kind: 'go', harmonic: 1 });
    expect(press('End')).toEqual({ kind: 'go', harmonic: 16 });
  });

  test('up and down change by 0.01, with Shift by 0.1', () => {
    const next = (key: string, shift = false) => {
      const act = press(key, shift);
      return act?.kind === 'change' ? heights(act.next)[3] : undefined;
    };
    expect([next('ArrowUp'), next('ArrowDown'), next('ArrowUp', true), next('ArrowDown', true)]).toEqual([
      0.26, 0.24, 0.35, 0.15,
    ]);
  });

  test('Delete takes the partial away, digits and signs open the exact field, other keys do nothing', () => {
    const act = press('Delete');
    expect(act?.kind === 'change' && act.next.partials).toEqual([partial(1, 1)]);
    expect(press('7')).toEqual({ kind: 'type', start: '7' });
    expect(press('-')).toEqual({ kind: 'type', start: '-' });
    expect(press('Enter')).toEqual({ kind: 'type', start: 0.25 });
    expect(press('a')).toBeNull();
    expect(press('Tab')).toBeNull();
  });

  test('a key on a bar without a partial gives it one', () => {
    expect(heights(setBar(source, { harmonic: 2, amplitude: 0.01 }))).toEqual({ 1: 1, 2: 0.01, 3: 0.25 });
  });
});
