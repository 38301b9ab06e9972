import { describe, expect, test } from 'vitest';
import { createBench } from '../../src/features/bench/state/bench.ts';
import { examples } from '../../src/features/bench/state/examples.ts';
import type { Keep } from '../../src/features/bench/state/storage.ts';
import type { Work } from '../../src/features/bench/state/wave.ts';
import { createSavedLinks, savedLinkKey, type SavedLink } from '../../src/features/bench/save/saved-links.ts';

const keep: Keep = {
  read: () => ({ kind: 'nothing' }),
  write: () => true,
  setAside: () => null,
  letGo: () => undefined,
  watch: () => () => undefined,
};
const port = { postMessage: () => undefined, onmessage: null, onerror: null, terminate: () => undefined };

/** Files of a browser; null in it where nothing is kept. */
function keptFiles(file: File | null = null) {
  return {
    file,
    read() {
      return Promise.resolve(this.file);
    },
    write(next: File | null) {
      this.file = next;
      return Promise.resolve();
    },
  };
}

const linkTo = (table: string, revision = 1): SavedLink => ({
  team: 'ninth-fathom',
  teamName: 'Ninth Fathom',
  table,
  title: table,
  revision,
  newest: revision,
  etag: `"${revision}"`,
});

function begin(kept: string | null = null, files = keptFiles()) {
  const storage = new Map(kept === null ? [] : [[savedLinkKey, kept]]);
  let hear: ((event: StorageEvent) => void) | undefined;
  const bench = createBench({ keep, startEngine: () => ({ ...port }) });
  const links = createSavedLinks({
    bench,
    storage: {
      getItem: (key) => storage.get(key) ?? null,
      setItem: (key, text) => void storage.set(key, text),
    },
    tabs: {
      addEventListener: (_type: string, listener: unknown) => {
        hear = listener as typeof hear;
      },
    } as Pick<Window, 'addEventListener'>,
    files,
  });
  const rename = (name: string) =>
    bench.change((work) => ({ ...work, definition: { ...work.definition, name } }));
  const present = () => bench.getState().history.present;
  return {
    bench,
    links,
    rename,
    present,
    fromOtherTab: (text: string) => hear?.({ key: savedLinkKey, newValue: text } as StorageEvent),
    kept: () => JSON.parse(storage.get(savedLinkKey) ?? 'null') as unknown,
  };
}

const other = (work: Work): Work => ({ ...work, definition: examples[2].work.definition });

describe('the file that the work on the bench was made from', () => {
  const file = new File(['1, 2'], 'old.c');

  test('goes with that work through changes and undo, and is handed out once', async () => {
    const { bench, links, rename, present } = begin();
    links.open(other, null, file);
    rename('Changed');
    bench.undo();
    bench.undo();
    expect(await links.takeOriginal()).toBeNull();
    bench.redo();
    links.markSaved(linkTo('lamp'), present());
    expect(await links.takeOriginal()).toBe(file);
    expect(await links.takeOriginal()).toBeNull();
    links.giveBackOriginal(file);
    expect(await links.takeOriginal()).toBe(file);
  });

  test('is found again after a reload, and no longer once it was handed out', async () => {
    const files = keptFiles();
    const before = begin(null, files);
    before.links.open(other, null, file);
    before.rename('Changed');
    await expect.poll(() => files.file).toBe(file);
    // Changes made before it is known what is there do not let it go.
    const after = begin(null, files);
    after.rename('Changed again');
    expect(await after.links.takeOriginal()).toBe(file);
    await expect.poll(() => files.file).toBeNull();
    expect(await begin(null, files).links.takeOriginal()).toBeNull();
  });

  test('gives way to other work, and lives as long as the page where the browser keeps no files', async () => {
    const files = keptFiles(file);
    const { links } = begin(null, files);
    links.open(other, linkTo('lamp'));
    await expect.poll(() => files.file).toBeNull();
    const none = {
      read: () => Promise.reject(new Error('no')),
      write: () => Promise.reject(new Error('no')),
    };
    const closed = begin(null, none as never);
    closed.links.open(other, null, file);
    expect(await closed.links.takeOriginal()).toBe(file);
  });
});

describe('which table the work on the bench belongs to', () => {
  test('none at first, and the one it was saved to from then on', () => {
    const { links, rename, present, kept } = begin();
    expect(links.getView()).toEqual({ link: null, isChanged: false });
    links.markSaved(linkTo('horn'), present());
    expect(links.getView()).toEqual({ link: linkTo('horn'), isChanged: false });
    rename('Longer horn');
    expect(links.getView()).toMatchObject({ link: { table: 'horn' }, isChanged: true });
    expect(kept()).toEqual({ link: linkTo('horn'), isChanged: true });
  });

  test('a change that is taken back is none', () => {
    const { bench, links, rename, present } = begin();
    links.markSaved(linkTo('horn'), present());
    rename('Other');
    bench.undo();
    expect(links.getView().isChanged).toBe(false);
    bench.redo();
    expect(links.getView().isChanged).toBe(true);
  });

  test('what was changed while a save was under way stays changed', () => {
    const { links, rename, present } = begin();
    const sent = present();
    rename('Typed meanwhile');
    links.markSaved(linkTo('horn'), sent);
    expect(links.getView()).toMatchObject({ link: { table: 'horn' }, isChanged: true });
  });

  test('undo past other work brings the table back that it belonged to, redo the other one', () => {
    const { bench, links, present } = begin();
    links.markSaved(linkTo('horn'), present());
    links.open(other, null);
    expect(links.getView()).toEqual({ link: null, isChanged: false });
    bench.undo();
    expect(links.getView()).toEqual({ link: linkTo('horn'), isChanged: false });
    bench.redo();
    expect(links.getView().link).toBeNull();
    links.open((work) => ({ ...work, definition: examples[3].work.definition }), linkTo('sine', 4));
    expect(links.getView()).toEqual({ link: linkTo('sine', 4), isChanged: false });
    bench.undo();
    bench.undo();
    expect(links.getView().link?.table).toBe('horn');
  });

  test('a revision newer than what undo brings back is known for it too', () => {
    const { bench, links, rename, present } = begin();
    links.markSaved(linkTo('horn', 1), present());
    rename('Second');
    links.markSaved(linkTo('horn', 2), present());
    bench.undo();
    expect(links.getView()).toEqual({ link: linkTo('horn', 2), isChanged: true });
  });

  test('opening the very work that is on the bench ties it to its table', () => {
    const { links } = begin();
    links.open((work) => work, linkTo('horn'));
    expect(links.getView()).toEqual({ link: linkTo('horn'), isChanged: false });
  });

  test('survives a reload, changed or not', () => {
    for (const isChanged of [false, true]) {
      const { links } = begin(JSON.stringify({ link: linkTo('horn'), isChanged }));
      expect(links.getView()).toEqual({ link: linkTo('horn'), isChanged });
    }
  });

  test.each(['', 'null', '{"link":{}}', '{"link":null}', '[]'])(
    'what cannot be read (%j) is no link',
    (text) => {
      expect(begin(text).links.getView()).toEqual({ link: null, isChanged: false });
    },
  );

  test('another tab’s table becomes this one’s, and older work keeps its own', () => {
    const { bench, links, rename, present, fromOtherTab } = begin();
    links.markSaved(linkTo('horn'), present());
    rename('Still the horn');
    fromOtherTab(JSON.stringify({ link: linkTo('lamp'), isChanged: false }));
    expect(links.getView()).toEqual({ link: linkTo('lamp'), isChanged: false });
    bench.undo();
    expect(links.getView().link?.table).toBe('horn');
  });
});
