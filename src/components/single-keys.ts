import { useEffect, useRef } from 'react';
import { createLive, useLive, type SettableLive } from '../live/index.ts';

/** Where the choice is kept; absent where single keys act, as they do at first. */
export const singleKeysStorageKey = 'stepwell.single-keys';

/** What takes characters as text. */
export const takesText =
  'input:not([type=radio], [type=checkbox], [type=range]), textarea, select, [contenteditable]';

/** Where the browser closes its storage to the page, the choice lasts as long as the page. */
function readKept(): boolean {
  try {
    return localStorage.getItem(singleKeysStorageKey) !== 'off';
  } catch {
    return true;
  }
}

function writeKept(areOn: boolean): void {
  try {
    if (areOn) localStorage.removeItem(singleKeysStorageKey);
    else localStorage.setItem(singleKeysStorageKey, 'off');
  } catch {
    // It cannot be kept.
  }
}

let setting: SettableLive<boolean> | null = null;

/** The one setting of this tab; it follows what other tabs choose. */
function theSetting(): SettableLive<boolean> {
  if (setting !== null) return setting;
  const made = createLive(readKept());
  addEventListener('storage', ({ key }) => {
    if (key === singleKeysStorageKey || key === null) made.set(readKept());
  });
  return (setting = made);
}

/** Whether keys without a modifier act, and what changes that (WCAG 2.2, 2.1.4 Character Key Shortcuts). */
export function useSingleKeySetting(): [areOn: boolean, set: (on: boolean) => void] {
  return [useLive(theSetting()), setSingleKeys];
}

function setSingleKeys(on: boolean): void {
  writeKept(on);
  theSetting().set(on);
}

/**
 * Calls `act` with each press of a single character, in lower case, wherever nothing takes it as text; it returns
 * whether the character was one of its own. All shortcuts without a modifier go through here, and none acts while they
 * are turned off or a dialog is open. Keys of what has the focus are no shortcuts and are handled there.
 */
export function useSingleKeys(act: (key: string) => boolean): void {
  const latest = useRef(act);
  useEffect(() => {
    latest.current = act;
  });
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      if (!theSetting().now() || !isSingle(event)) return;
      if (latest.current(event.key.toLowerCase())) event.preventDefault();
    };
    addEventListener('keydown', press);
    return () => removeEventListener('keydown', press);
  }, []);
}

function isSingle(event: KeyboardEvent): boolean {
  const { key, target, ctrlKey, metaKey, altKey, repeat, defaultPrevented } = event;
  if (key.length !== 1 || ctrlKey || metaKey || altKey || repeat || defaultPrevented) return false;
  if (target instanceof Element && target.closest(takesText) !== null) return false;
  return document.querySelector('dialog[open]') === null;
}
