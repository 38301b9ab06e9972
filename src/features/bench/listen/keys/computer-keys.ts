import { useEffect, useRef, useState, type RefObject } from 'react';
import { takesText } from '../../../../components/single-keys.ts';

/**
 * Two rows of twelve keys by their place, whatever is printed on them (UI Events KeyboardEvent code Values, W3C): the
 * home row for the lower octave, the row above it for the upper one.
 */
const rows = [
  'KeyA KeyS KeyD KeyF KeyG KeyH KeyJ KeyK KeyL Semicolon Quote Backslash',
  'KeyQ KeyW KeyE KeyR KeyT KeyY KeyU KeyI KeyO KeyP BracketLeft BracketRight',
].map((row) => row.split(' '));

/** What stands on these keys where they are laid out for English, United States. */
const printed: Readonly<Record<string, string>> = {
  Semicolon: ';',
  Quote: "'",
  Backslash: '\\',
  BracketLeft: '[',
  BracketRight: ']',
};

/** Steps above the first note that a key stands for; null for other keys. */
export function stepOfKey(code: string): number | null {
  for (const [course, codes] of rows.entries()) {
    const step = codes.indexOf(code);
    if (step >= 0) return 12 * course + step;
  }
  return null;
}

interface KeyboardLayout {
  getLayoutMap: () => Promise<ReadonlyMap<string, string>>;
}

/** What is printed on the key of each step, as far as the browser tells; else as on an English keyboard. */
export function useKeyCaps(): readonly string[] {
  const [layout, setLayout] = useState<ReadonlyMap<string, string> | null>(null);
  useEffect(() => {
    const { keyboard } = navigator as Navigator & { keyboard?: KeyboardLayout };
    // Not every browser has it, and a page within another may be refused.
    void keyboard?.getLayoutMap?.().then(setLayout, () => undefined);
  }, []);
  return rows.flat().map((code) => (layout?.get(code) ?? printed[code] ?? code.slice(3)).toUpperCase());
}

interface ComputerKeys {
  /** Act wherever nothing takes text; else only while the focus is in the group (WCAG 2.2, 2.1.4). */
  readonly areOn: boolean;
  readonly group: RefObject<HTMLElement | null>;
  readonly onPress: (code: string, step: number) => void;
  readonly onRelease: (code: string) => void;
  readonly onReleaseAll: () => void;
}

/** Letter keys as notes. Held keys do not repeat; whatever takes the keyboard away lets all of them go. */
export function useComputerKeys(keys: ComputerKeys): void {
  const latest = useRef(keys);
  useEffect(() => {
    latest.current = keys;
  });
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      const step = stepOfKey(event.code);
      if (step === null || !acts(event, latest.current)) return;
      // It is no shortcut of the page then, and nothing else's.
      event.preventDefault();
      if (!event.repeat) latest.current.onPress(event.code, step);
    };
    const release = (event: KeyboardEvent) => latest.current.onRelease(event.code);
    const releaseAll = () => latest.current.onReleaseAll();
    const look = () => {
      if (document.hidden) releaseAll();
    };
    // Before the page's own shortcuts.
    addEventListener('keydown', press, { capture: true });
    addEventListener('keyup', release, { capture: true });
    addEventListener('blur', releaseAll);
    document.addEventListener('visibilitychange', look);
    return () => {
      removeEventListener('keydown', press, { capture: true });
      removeEventListener('keyup', release, { capture: true });
      removeEventListener('blur', releaseAll);
      document.removeEventListener('visibilitychange', look);
    };
  }, []);
}

function acts({ target, ctrlKey, metaKey, altKey }: KeyboardEvent, { areOn, group }: ComputerKeys): boolean {
  if (ctrlKey || metaKey || altKey) return false;
  if (target instanceof Element && target.closest(takesText) !== null) return false;
  if (document.querySelector('dialog[open]') !== null) return false;
  return areOn || (target instanceof Node && (group.current?.contains(target) ?? false));
}
