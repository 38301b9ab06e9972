import { useSyncExternalStore } from 'react';
import type { Definition } from '../../../../shared/contract/index.ts';
import { partOf, type Live } from '../../../live/index.ts';
import { createBench, type Bench, type BenchState } from './bench.ts';
import { createKeep } from './storage.ts';

let bench: Bench | null = null;

/** The one bench of this tab. It outlives the page it is shown on, so that its history does too. */
export function theBench(): Bench {
  if (bench === null) {
    const opened = createBench({ keep: createKeep(storageOfBrowser(), window) });
    // The only event a phone sends reliably before it ends a page.
    addEventListener('visibilitychange', () => opened.keepNow());
    addEventListener('pagehide', () => opened.keepNow());
    bench = opened;
  }
  return bench;
}

/** A part of the bench's state. The selector must return the same part while that has not changed. */
export function useBench<Part>(select: (state: BenchState) => Part): Part {
  const { subscribe, getState } = theBench();
  return useSyncExternalStore(subscribe, () => select(getState()));
}

/** The same, to be followed without rendering. */
export function liveBench<Part>(select: (state: BenchState) => Part): Live<Part> {
  const { subscribe, getState } = theBench();
  return partOf({ now: getState, subscribe }, select);
}

export function useDefinition<Part>(select: (definition: Definition) => Part): Part {
  return useBench(({ history }) => select(history.present.definition));
}

/** Changes the definition on the bench; changes of the same `coalesce` that follow each other are one step. */
export function changeDefinition(update: (definition: Definition) => Definition, coalesce?: string): void {
  theBench().change((work) => ({ ...work, definition: update(work.definition) }), { coalesce });
}

/** Where the browser closes its storage to the page, reading finds nothing and writing tells that it is refused. */
function storageOfBrowser(): Pick<Storage, 'getItem' | 'setItem' | 'removeItem'> {
  try {
    return window.localStorage;
  } catch {
    return {
      getItem: () => null,
      setItem: () => {
        throw new DOMException('The storage is closed.', 'SecurityError');
      },
      removeItem: () => undefined,
    };
  }
}
