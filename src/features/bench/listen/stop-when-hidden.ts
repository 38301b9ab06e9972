import { useEffect, useState } from 'react';
import type { AudioPreview, PreviewState } from '../../../audio/index.ts';
import { createKeptSwitch } from './kept-switch.ts';

/** Whether the sound ends when its tab is hidden. */
export const stopsWhenHidden = createKeptSwitch('stepwell.listen.stop-when-hidden', true);

/** Ends the sound when its tab is hidden, where that is chosen. Answers whether that is why it is silent now. */
export function useStopWhenHidden(preview: AudioPreview | null, status: PreviewState['status']): boolean {
  const [wasHidden, setWasHidden] = useState(false);
  const isOn = status !== 'silent';
  useEffect(() => {
    if (!isOn || preview === null) return;
    const look = () => {
      if (!document.hidden || !stopsWhenHidden.now()) return;
      preview.stop();
      setWasHidden(true);
    };
    document.addEventListener('visibilitychange', look);
    // It may have been hidden while the sound was on its way.
    look();
    return () => document.removeEventListener('visibilitychange', look);
  }, [isOn, preview]);
  if (isOn && wasHidden) setWasHidden(false);
  return wasHidden && !isOn;
}
