import { z } from 'zod';
import type { Bench } from '../state/bench.ts';
import { sameValue } from '../state/same-value.ts';
import type { Wave, Work } from '../state/wave.ts';

const linkSchema = z.strictObject({
  team: z.string(),
  teamName: z.string(),
  table: z.string(),
  title: z.string(),
  /** The revision that the work was saved as, or began with. */
  revision: z.int(),
  /** The newest revision that this page has seen. */
  newest: z.int(),
  /** Of the table's state that this page has seen; the next revision is made from that. */
  etag: z.string(),
});

/** The table of a library that the work on the bench belongs to. */
export type SavedLink = z.infer<typeof linkSchema>;

export interface SavedView {
  /** None while the work has not been saved anywhere. */
  readonly link: SavedLink | null;
  /** Whether the work has been changed since that revision. */
  readonly isChanged: boolean;
}

const keptSchema = z.strictObject({ link: linkSchema.nullable(), isChanged: z.boolean() });

export const savedLinkKey = 'stepwell.bench.saved-as';

/** One lineage of work: from when it was put on the bench, through all its changes. */
interface Lineage {
  link: SavedLink | null;
  /** What was saved last, where this page knows it. */
  saved: Pick<Wave, 'definition' | 'playback'> | null;
  /** The file that the work was made from, as long as it has not been kept with a revision. */
  original?: File | null;
}

export interface SavedLinks {
  getView(): SavedView;
  subscribe(listener: () => void): () => void;
  /** Puts other work on the bench, as one step of undo; `link` says which table it is, if any. */
  open(update: (work: Work) => Work, link: SavedLink | null, original?: File | null): void;
  /** The file that the present work was made from, handed out once; what was not kept is given back. */
  takeOriginal(): Promise<File | null>;
  giveBackOriginal(file: File): void;
  /** Notes that `saved` is now what the link's revision holds. */
  markSaved(link: SavedLink, saved: Pick<Wave, 'definition' | 'playback'>): void;
}

export interface SavedLinksParts {
  bench: Pick<Bench, 'getState' | 'subscribe' | 'change'>;
  storage: Pick<Storage, 'getItem' | 'setItem'>;
  tabs: Pick<Window, 'addEventListener'>;
  /** Where the file that the present work was made from outlives a reload. Both may reject: then it does not. */
  files: { read(): Promise<File | null>; write(file: File | null): Promise<void> };
}

/**
 * Which table the work on the bench belongs to. Undo and redo may bring work of another table back, and its link must
 * come with it: each work is remembered with its lineage, for as long as the history holds the work.
 */
export function createSavedLinks({ bench, storage, tabs, files }: SavedLinksParts): SavedLinks {
  const listeners = new Set<() => void>();
  const lineages = new WeakMap<Work, Lineage>();
  const presentWork = () => bench.getState().history.present;

  let present = presentWork();
  let next: Lineage | null = null;
  let view: SavedView = readKept(readText()) ?? { link: null, isChanged: false };
  let current = lineageOf(view);
  lineages.set(present, current);
  let keptFile: File | null = null;
  const foundFile = findFile(current);

  bench.subscribe(() => {
    if (presentWork() === present) return;
    present = presentWork();
    take(lineages.get(present) ?? next ?? current);
    next = null;
  });
  tabs.addEventListener('storage', (event) => {
    if (event.key !== savedLinkKey) return;
    const kept = readKept(event.newValue);
    if (kept === null) return;
    // The other tab's work is on its way, or here already. This tab's own older work keeps its own lineage.
    take(lineageOf(kept), { isForeign: true });
  });

  function lineageOf({ link, isChanged }: SavedView): Lineage {
    return { link, saved: isChanged ? null : present };
  }

  async function findFile(beginning: Lineage): Promise<void> {
    keptFile = await files.read().catch(() => null);
    beginning.original ??= keptFile;
  }

  /** Never before it is known which file is there: that would write over it. */
  async function keepFile(): Promise<void> {
    await foundFile;
    const file = current.original ?? null;
    if (file === keptFile) return;
    keptFile = file;
    // Where the browser keeps no files, this one lives as long as the page.
    await files.write(file).catch(() => undefined);
  }

  function take(lineage: Lineage, { isForeign = false } = {}): void {
    current = lineage;
    lineages.set(present, lineage);
    if (!isForeign) void keepFile();
    const { link, saved } = lineage;
    const isChanged = link !== null && (saved === null || !isSame(saved, present));
    if (view.link === link && view.isChanged === isChanged) return;
    view = { link, isChanged };
    if (!isForeign) writeText(JSON.stringify(view));
    for (const listener of listeners) listener();
  }

  function readText(): string | null {
    try {
      return storage.getItem(savedLinkKey);
    } catch {
      return null;
    }
  }

  function writeText(text: string): void {
    try {
      storage.setItem(savedLinkKey, text);
    } catch {
      // The bench itself says that nothing is kept.
    }
  }

  return {
    getView: () => view,
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    open(update, link, original = null) {
      const work = update(presentWork());
      next = { link, saved: link === null ? null : work, original };
      const lineage = next;
      bench.change(() => work);
      next = null;
      // The bench takes no step for work that is the same; it belongs to the link all the same.
      if (current !== lineage) take(lineage);
    },
    async takeOriginal() {
      const lineage = current;
      await foundFile;
      const original = lineage.original ?? null;
      lineage.original = null;
      void keepFile();
      return original;
    },
    giveBackOriginal(file) {
      current.original = file;
      void keepFile();
    },
    markSaved(link, saved) {
      Object.assign(current, { link, saved });
      take(current);
    },
  };
}

const isSame = (one: Pick<Wave, 'definition' | 'playback'>, other: Pick<Wave, 'definition' | 'playback'>) =>
  sameValue(one.definition, other.definition) && sameValue(one.playback, other.playback);

function readKept(text: string | null): SavedView | null {
  if (text === null) return null;
  try {
    return keptSchema.parse(JSON.parse(text));
  } catch {
    return null;
  }
}
