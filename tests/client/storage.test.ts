import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readDraft } from '../../src/features/bench/state/draft.ts';
import { examples } from '../../src/features/bench/state/examples.ts';
import { createKeep, readKept, storageKeys, writeKept } from '../../src/features/bench/state/storage.ts';
import type { Work } from '../../src/features/bench/state/wave.ts';
import { throughJson, works } from './arbitraries.ts';

const { work } = examples[0];

/** A draft of the first example with other numbers in its table. */
const typed = (table: Partial<Work['definition']['table']>): Work => ({
  ...work,
  definition: { ...work.definition, table: { ...work.definition.table, ...table } },
});

function memory(entries: Record<string, string> = {}) {
  const held = new Map(Object.entries(entries));
  return {
    held,
    getItem: (key: string) => held.get(key) ?? null,
    setItem: (key: string, text: string) => void held.set(key, text),
    removeItem: (key: string) => void held.delete(key),
  };
}

describe('what is kept', () => {
  it('is read back as it was written', () => {
    fc.assert(
      fc.property(works, (one) => {
        expect(readKept(writeKept(one))).toEqual({ kind: 'work', work: throughJson(one) });
      }),
    );
  });

  it.each([
    [typed({ bits: 17 })],
    [typed({ length: 1, bits: 0 })],
    [typed({ bits: Number.NaN, startPhaseDeg: -Infinity })],
    [typed({ bits: 7.5 })],
    [{ ...work, definition: { ...work.definition, name: '' } }],
    [
      {
        ...work,
        definition: { ...work.definition, source: { kind: 'harmonics' as const, offset: 0, partials: [] } },
      },
    ],
    [
      {
        ...work,
        definition: { ...work.definition, level: { ...work.definition.level, transfer: { gamma: 99 } } },
      },
    ],
  ])('keeps a draft that cannot be built as it was typed (%#)', (draft) => {
    expect(readKept(writeKept(draft))).toEqual({ kind: 'work', work: draft });
  });

  it('fills in fields that a draft of an earlier version lacks', () => {
    const { coding: _none, ...table } = typed({ bits: 17 }).definition.table;
    expect(readDraft({ ...work.definition, table })?.table).toMatchObject({
      bits: 17,
      coding: 'offset-binary',
    });
  });

  it.each([
    ['', 'no JSON'],
    ['{"version":1', 'cut JSON'],
    ['{}', 'nothing in it'],
    [writeKept(work).replace('"version":1', '"version":2'), 'another version'],
    [writeKept(work).replace('"harmonics"', '"sketch"'), 'an unknown kind'],
    [writeKept(work).replace('"bits":8', '"bits":"8"'), 'a text for a number'],
    [writeKept(work).replace('"bits":8', '"bits":8,"depth":8'), 'an unknown field'],
    [writeKept(work).replace('"loop"', '"round"'), 'an unknown playback'],
  ])('calls %.30s damaged: %s', (text) => {
    expect(readKept(text)).toEqual({ kind: 'damaged' });
  });
});

describe('the keep', () => {
  it('sets damaged text aside whole, and the next writing does not cover it', () => {
    const storage = memory({ [storageKeys.bench]: 'sonar?' });
    const keep = createKeep(storage, new EventTarget() as unknown as Window);
    expect(keep.read()).toEqual({ kind: 'damaged' });
    expect(keep.write(work)).toBe(true);
    expect(keep.setAside()).toBe('sonar?');
    expect(keep.read()).toEqual({ kind: 'work', work });
    keep.letGo();
    expect(keep.setAside()).toBeNull();
  });

  it('tells that a full storage keeps nothing', () => {
    const storage = {
      ...memory(),
      setItem: () => {
        throw new DOMException('full', 'QuotaExceededError');
      },
    };
    expect(createKeep(storage, new EventTarget() as unknown as Window).write(work)).toBe(false);
  });
});
