import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  beginHistory,
  longestHistory,
  pauseMs,
  redo,
  sealStep,
  takeChange,
  undo,
  type History,
} from '../../src/features/bench/state/history.ts';

interface Change {
  value: number;
  coalesce: string | undefined;
  wait: number;
  isHeld: boolean;
}

const changes = fc.array(
  fc.record<Change>({
    value: fc.integer(),
    coalesce: fc.constantFrom(undefined, 'bits', 'drag'),
    wait: fc.integer({ min: 0, max: 2 * pauseMs }),
    isHeld: fc.boolean(),
  }),
  { maxLength: 60 },
);

function run(list: readonly Change[]): History<{ value: number }> {
  let at = 0;
  return list.reduce(
    (history, { value, wait, ...how }) => takeChange(history, { value }, { ...how, at: (at += wait) }),
    beginHistory({ value: 0 }),
  );
}

describe('history', () => {
  it('gives back every state by undo and again by redo', () => {
    fc.assert(
      fc.property(changes, (list) => {
        const end = run(list);
        let back = end;
        while (back.past.length > 0) back = undo(back);
        expect(back.present.value).toBe(0);
        expect(back.future.map(({ value }) => value)).toEqual(
          [...end.past.slice(1), ...(end.past.length > 0 ? [end.present] : [])].map(({ value }) => value),
        );
        let forth = back;
        while (forth.future.length > 0) forth = redo(forth);
        expect(forth.present).toEqual(end.present);
        expect(forth.past).toEqual(end.past);
      }),
    );
  });

  it('takes each unnamed change as a step of its own', () => {
    fc.assert(
      fc.property(changes, (list) => {
        const unnamed = list.map((change) => ({ ...change, coalesce: undefined }));
        expect(run(unnamed).past).toHaveLength(Math.min(unnamed.length, longestHistory));
      }),
    );
  });

  it('makes one step of a drag, however long it rests', () => {
    const values = [1, 2, 3, 4];
    const dragged = run(
      values.map((value) => ({ value, coalesce: 'drag', wait: 10 * pauseMs, isHeld: true })),
    );
    expect(dragged.past).toEqual([{ value: 0 }]);
    expect(undo(dragged).present).toEqual({ value: 0 });
  });

  it('makes one step of typing, and a new one after a pause, another field or a seal', () => {
    const typed = takeChange(beginHistory('a'), 'ab', { coalesce: 'name', at: 0 });
    const further = (coalesce: string, at: number, from = typed) => takeChange(from, 'abc', { coalesce, at });
    expect(further('name', pauseMs).past).toEqual(['a']);
    expect(further('name', pauseMs + 1).past).toEqual(['a', 'ab']);
    expect(further('bits', 0).past).toEqual(['a', 'ab']);
    expect(further('name', 0, sealStep(typed)).past).toEqual(['a', 'ab']);
  });

  it('never joins a step that was taken back', () => {
    const typed = takeChange(beginHistory('a'), 'ab', { coalesce: 'name', at: 0 });
    const again = takeChange(undo(typed), 'ac', { coalesce: 'name', at: 1 });
    expect(again).toMatchObject({ past: ['a'], present: 'ac', future: [] });
  });

  it(`keeps the newest ${longestHistory} steps`, () => {
    let history = beginHistory(0);
    for (let step = 1; step <= longestHistory + 50; step += 1)
      history = takeChange(history, step, { at: step });
    expect(history.past).toHaveLength(longestHistory);
    expect(history.past[0]).toBe(50);
  });

  it('changes nothing where there is nothing to take back or to do again', () => {
    const history = beginHistory(1);
    expect(undo(history)).toBe(history);
    expect(redo(history)).toBe(history);
    expect(takeChange(history, 1, { at: 0 })).toBe(history);
  });
});
