import { useEffect } from 'react';
import { useKeyGroup, type KeyGroup } from '../../../components/index.ts';
import type { FlightId } from '../problems/field-names.ts';
import { theBench } from '../state/use-bench.ts';
import { flightIds } from './open-flights.ts';

const command = /Mac|iP/.test(navigator.platform) ? '⌘' : 'Ctrl';

const benchKeys: KeyGroup = {
  title: 'Bench',
  keys: [
    { caps: [command, 'Z'], does: 'Undo' },
    { caps: [command, 'Shift', 'Z'], does: 'Redo' },
    { caps: ['1'], does: 'Open Shape and go there' },
    { caps: ['2'], does: 'Open Quantise and go there' },
    { caps: ['3'], does: 'Open Output and go there' },
    { caps: ['4'], does: 'Open Export and go there' },
    { caps: ['L'], does: 'Copy a read-only link to the wave' },
  ],
};

/** Undo and redo anywhere on the page; digits and letters where nothing takes them as text. */
export function useBenchKeys(setOpen: (id: FlightId, isOpen: boolean) => void, copyLink: () => void): void {
  useKeyGroup(benchKeys);
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.altKey || document.querySelector('dialog[open]') !== null) return;
      const act = event.ctrlKey || event.metaKey ? stepBy(event) : placeBy(event, setOpen, copyLink);
      if (act === undefined) return;
      event.preventDefault();
      act();
    };
    addEventListener('keydown', press);
    return () => removeEventListener('keydown', press);
  }, [setOpen, copyLink]);
}

function stepBy({ key, shiftKey, target }: KeyboardEvent): (() => void) | undefined {
  if (target instanceof HTMLElement && target.isContentEditable) return undefined;
  const { undo, redo } = theBench();
  switch (key.toLowerCase()) {
    case 'z':
      return shiftKey ? redo : undo;
    case 'y':
      return redo;
    default:
      return undefined;
  }
}

const takesText =
  'input:not([type=radio], [type=checkbox], [type=range]), textarea, select, [contenteditable]';

function placeBy(
  { key, target }: KeyboardEvent,
  setOpen: (id: FlightId, isOpen: boolean) => void,
  copyLink: () => void,
): (() => void) | undefined {
  if (target instanceof Element && target.closest(takesText) !== null) return undefined;
  if (key === 'l' || key === 'L') return copyLink;
  const id = /^[1-4]$/.test(key) ? flightIds[Number(key) - 1] : undefined;
  if (id === undefined) return undefined;
  return () => {
    setOpen(id, true);
    const tread = document.querySelector<HTMLElement>(`#${id} button`);
    tread?.focus({ preventScroll: true });
    tread?.scrollIntoView({ block: 'nearest' });
  };
}
