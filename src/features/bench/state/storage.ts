import { z } from 'zod';
import { readDraft } from './draft.ts';
import { exportChoiceSchema, playbackSchema, type Work } from './wave.ts';

/** Where the bench is kept, and where something unreadable found there is put so that nobody loses it. */
export const storageKeys = { bench: 'stepwell.bench', setAside: 'stepwell.bench.set-aside' } as const;

const keptSchema = z.strictObject({
  version: z.literal(1),
  definition: z.unknown().transform((input, context) => {
    const draft = readDraft(input);
    if (draft !== null) return draft;
    context.addIssue({ code: 'custom', message: 'a definition', input });
    return z.NEVER;
  }),
  playback: playbackSchema,
  exporting: exportChoiceSchema,
});

export type KeptWork = { kind: 'nothing' } | { kind: 'work'; work: Work } | { kind: 'damaged' };

/** Reads what was kept, as text. */
export function readKept(text: string | null): KeptWork {
  if (text === null) return { kind: 'nothing' };
  try {
    const { definition, playback, exporting } = keptSchema.parse(JSON.parse(text, reviveNumber));
    return { kind: 'work', work: { definition, playback, exporting } };
  } catch {
    return { kind: 'damaged' };
  }
}

/** Writes work as text that `readKept` reads back to equal work, problems and all. */
export function writeKept({ definition, playback, exporting }: Work): string {
  return JSON.stringify({ version: 1, definition, playback, exporting }, writeNumber);
}

/** The bench's place in this browser, shared by all its tabs. */
export interface Keep {
  /** What was kept. Unreadable text is moved aside first, so that the next writing does not cover it. */
  read(): KeptWork;
  /** Keeps the work; `false` where the browser refuses (storage full or closed). */
  write(work: Work): boolean;
  /** Text that could not be read and was set aside, until it is let go. */
  setAside(): string | null;
  letGo(): void;
  /** Calls back with work that another tab has kept; answers how to stop. */
  watch(onWork: (work: Work) => void): () => void;
}

export function createKeep(
  storage: Pick<Storage, 'getItem' | 'setItem' | 'removeItem'>,
  tabs: Pick<Window, 'addEventListener' | 'removeEventListener'>,
): Keep {
  return {
    read() {
      const text = storage.getItem(storageKeys.bench);
      const kept = readKept(text);
      if (kept.kind === 'damaged' && text !== null) {
        storage.removeItem(storageKeys.bench);
        storage.setItem(storageKeys.setAside, text);
      }
      return kept;
    },
    write(work) {
      try {
        storage.setItem(storageKeys.bench, writeKept(work));
        return true;
      } catch {
        return false;
      }
    },
    setAside: () => storage.getItem(storageKeys.setAside),
    letGo: () => storage.removeItem(storageKeys.setAside),
    watch(onWork) {
      const hear = (event: StorageEvent) => {
        if (event.storageArea !== storage || event.key !== storageKeys.bench) return;
        const kept = readKept(event.newValue);
        if (kept.kind === 'work') onWork(kept.work);
      };
      tabs.addEventListener('storage', hear);
      return () => tabs.removeEventListener('storage', hear);
    },
  };
}

const notFinite = 'stepwell:number';

/** JSON has no NaN and no infinity, but a draft may hold them. */
function writeNumber(_key: string, value: unknown): unknown {
  return typeof value === 'number' && !Number.isFinite(value) ? { [notFinite]: String(value) } : value;
}

function reviveNumber(_key: string, value: unknown): unknown {
  return typeof value === 'object' && value !== null && notFinite in value ? Number(value[notFinite]) : value;
}
