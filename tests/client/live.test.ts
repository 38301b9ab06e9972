import fc from 'fast-check';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { calmed, createLive, joined, lasting, partOf, type Live } from '../../src/live/index.ts';

/** All that a live value tells, with when. */
function heard<Value>(live: Live<Value>): { told: { at: number; value: Value }[]; end: () => void } {
  const told: { at: number; value: Value }[] = [];
  return { told, end: live.subscribe(() => told.push({ at: Date.now(), value: live.now() })) };
}

beforeEach(() => void vi.useFakeTimers({ now: 0 }));
afterEach(() => void vi.useRealTimers());

describe('a part of a live value', () => {
  it('tells only of its own changes, and is made once a value', () => {
    const whole = createLive({ count: 1, name: 'a' });
    const map = vi.fn(({ count }: { count: number }) => count);
    const part = partOf(whole, map);
    const { told } = heard(part);
    whole.set({ count: 1, name: 'b' });
    expect(told).toEqual([]);
    whole.set({ count: 2, name: 'b' });
    expect([part.now(), part.now(), told.map(({ value }) => value)]).toEqual([2, 2, [2]]);
    expect(map).toHaveBeenCalledTimes(3);
  });

  it('of two values tells once where both follow from one change', () => {
    const whole = createLive(3);
    const twice = partOf(whole, (count) => 2 * count);
    const sum = joined(whole, twice, (one, other) => one + other);
    const { told, end } = heard(sum);
    whole.set(5);
    expect(told.map(({ value }) => value)).toEqual([15]);
    end();
    whole.set(6);
    expect(told).toHaveLength(1);
    expect(sum.now()).toBe(18);
  });
});

describe('a calmed value', () => {
  it('tells a first change at once, others no oftener than told to, and the last one always', () => {
    const gaps = fc.array(fc.integer({ min: 0, max: 250 }), { minLength: 1, maxLength: 40 });
    fc.assert(
      fc.property(gaps, (waits) => {
        vi.setSystemTime(0);
        const source = createLive(0);
        const { told, end } = heard(calmed(source, 100));
        waits.forEach((wait, index) => {
          vi.advanceTimersByTime(wait);
          source.set(index + 1);
        });
        vi.advanceTimersByTime(100);
        expect(told[0]).toEqual({ at: waits[0], value: 1 });
        expect(told.at(-1)?.value).toBe(waits.length);
        for (let i = 1; i < told.length; i += 1)
          expect(told[i].at - told[i - 1].at).toBeGreaterThanOrEqual(100);
        end();
        expect(vi.getTimerCount()).toBe(0);
      }),
      { seed: 31, numRuns: 100 },
    );
  });

  it('is never behind where nobody listens', () => {
    const source = createLive('a');
    const calm = calmed(source, 100);
    heard(calm).end();
    source.set('b');
    expect(calm.now()).toBe('b');
    const { told } = heard(calm);
    source.set('c');
    source.set('d');
    expect([calm.now(), told.map(({ value }) => value)]).toEqual(['c', ['c']]);
  });
});

describe('a lasting condition', () => {
  it('tells once it has held for so long, and at once when it ends', () => {
    const source = createLive(false);
    const { told } = heard(lasting(source, 400));
    source.set(true);
    vi.advanceTimersByTime(399);
    source.set(false);
    vi.advanceTimersByTime(1_000);
    source.set(true);
    vi.advanceTimersByTime(400);
    vi.advanceTimersByTime(50);
    source.set(false);
    expect(told).toEqual([
      { at: 1_799, value: true },
      { at: 1_849, value: false },
    ]);
  });
});
