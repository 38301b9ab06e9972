import { useEffect } from 'react';
import { useKeyGroup, type KeyGroup } from '../../../components/index.ts';

const listenKeys: KeyGroup = { title: 'Listening', keys: [{ caps: ['P'], does: 'Play or stop' }] };

const takesText =
  'input:not([type=radio], [type=checkbox], [type=range]), textarea, select, [contenteditable]';

/** P plays and stops wherever nothing takes it as text. */
export function usePlayKey(toggle: () => void): void {
  useKeyGroup(listenKeys);
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      const isPlain =
        !event.ctrlKey && !event.metaKey && !event.altKey && !event.repeat && !event.defaultPrevented;
      if (!isPlain || event.key.toLowerCase() !== 'p' || document.querySelector('dialog[open]') !== null)
        return;
      if (event.target instanceof Element && event.target.closest(takesText) !== null) return;
      event.preventDefault();
      toggle();
    };
    addEventListener('keydown', press);
    return () => removeEventListener('keydown', press);
  }, [toggle]);
}
