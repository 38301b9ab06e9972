import { useEffect, useSyncExternalStore } from 'react';

/** Keys that belong together, as the key sheet lists them. */
export interface KeyGroup {
  /** Heading, e.g. "Drawings". */
  title: string;
  /** Each line: the caps to press together (`['Shift', '→']`) and what they do. */
  keys: readonly {
    caps: readonly string[];
    does: string;
    /** Acts without a modifier wherever the focus is; can be turned off. */
    isSingle?: boolean;
  }[];
}

let groups: readonly KeyGroup[] = [];
const listeners = new Set<() => void>();

function publish(next: readonly KeyGroup[]) {
  groups = next;
  listeners.forEach((listener) => {
    listener();
  });
}

/** The list behind the `?` sheet; parts of the application add their keys while they are on screen. */
export const keySheet = {
  /** Adds a group and returns what takes it off again. */
  add(group: KeyGroup): () => void {
    publish([...groups, group]);
    return () => {
      publish(groups.filter((other) => other !== group));
    };
  },
  groups: () => groups,
  subscribe(listener: () => void): () => void {
    listeners.add(listener);
    return () => listeners.delete(listener);
  },
};

/** Lists a group of keys for as long as the component is mounted. Pass a constant made outside the component. */
export function useKeyGroup(group: KeyGroup): void {
  useEffect(() => keySheet.add(group), [group]);
}

/** All groups on the sheet now, each title once. */
export function useKeyGroups(): readonly KeyGroup[] {
  return useSyncExternalStore(keySheet.subscribe, keySheet.groups);
}
