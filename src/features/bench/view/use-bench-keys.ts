import { useEffect } from 'react';
import { useKeyGroup, useSingleKeys, type KeyGroup } from '../../../components/index.ts';
import type { FlightId } from '../problems/field-names.ts';
import { theBench } from '../state/use-bench.ts';
import { flightIds } from './open-flights.ts';

const command = /Mac|iP/.test(navigator.platform) ? '⌘' : 'Ctrl';

const benchKeys: KeyGroup = {
  title: 'Bench',
  keys: [
    { caps: [command, 'Z'], does: 'Undo' },
    { caps: [command, 'Shift', 'Z'], does: 'Redo' },
    { caps: ['1'], does: 'Open Shape and go there', isSingle: true },
    { caps: ['2'], does: 'Open Quantise and go there', isSingle: true },
    { caps: ['3'], does: 'Open Output and go there', isSingle: true },
    { caps: ['4'], does: 'Open Export and go there', isSingle: true },
    { caps: ['L'], does: 'Copy a read-only link to the wave', isSingle: true },
  ],
};

/** Undo and redo anywhere on the page; single keys where nothing takes them as text. */
export function useBenchKeys(setOpen: (id: FlightId, isOpen: boolean) => void, copyLink: () => void): void {
  useKeyGroup(benchKeys);
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.altKey || document.querySelector('dialog[open]') !== null) return;
      const act = event.ctrlKey || event.metaKey ? stepBy(event) : undefined;
      if (act === undefined) return;
      event.preventDefault();
      act();
    };
    addEventListener('keydown', press);
    return () => removeEventListener('keydown', press);
  }, []);
  useSingleKeys((key) => {
    const id = /^[1-4]$/.test(key) ? flightIds[Number(key) - 1] : undefined;
    if (id !== undefined) goToFlight(id, setOpen);
    else if (key === 'l') copyLink();
    else return false;
    return true;
  });
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

function goToFlight(id: FlightId, setOpen: (id: FlightId, isOpen: boolean) => void): void {
  setOpen(id, true);
  const tread = document.querySelector<HTMLElement>(`#${id} button`);
  tread?.focus({ preventScroll: true });
  tread?.scrollIntoView({ block: 'nearest' });
}
