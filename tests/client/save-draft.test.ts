import { expect, test } from 'vitest';
import { emptyDraft, withKey } from '../../src/features/bench/save/save-draft.ts';

function numbered() {
  let made = 0;
  return () => `key ${(made += 1)}`;
}

test('the same request keeps its key, however often it is sent', async () => {
  const make = numbered();
  const request = ['ninth-fathom', { title: 'Horn', definition: { bits: 8 } }];
  const first = await withKey(emptyDraft, request, make);
  const again = await withKey(first.draft, structuredClone(request), make);
  expect([first.key, again.key]).toEqual(['key 1', 'key 1']);
});

test('another request gets another key', async () => {
  const make = numbered();
  const first = await withKey({ ...emptyDraft, note: 'typed' }, ['a', { bits: 8 }], make);
  const second = await withKey(first.draft, ['a', { bits: 9 }], make);
  const third = await withKey(second.draft, ['b', { bits: 9 }], make);
  expect([first.key, second.key, third.key]).toEqual(['key 1', 'key 2', 'key 3']);
  expect(third.draft.note).toBe('typed');
});
