import { createLive, type Live } from '../../../live/index.ts';

export interface KeptSwitch extends Live<boolean> {
  readonly set: (isOn: boolean) => void;
}

/** On or off, kept by the browser; where its storage is closed to the page, for as long as the page. */
export function createKeptSwitch(storageKey: string, atFirst: boolean): KeptSwitch {
  const live = createLive(read());
  return {
    now: live.now,
    subscribe: live.subscribe,
    set(isOn) {
      live.set(isOn);
      try {
        if (isOn === atFirst) localStorage.removeItem(storageKey);
        else localStorage.setItem(storageKey, isOn ? 'on' : 'off');
      } catch {
        // It cannot be kept.
      }
    },
  };

  function read(): boolean {
    try {
      const kept = localStorage.getItem(storageKey);
      return kept === null ? atFirst : kept === 'on';
    } catch {
      return atFirst;
    }
  }
}
