import { useCallback, useEffect, useRef, useState, useSyncExternalStore } from 'react';
import { openPreview } from './open-preview.ts';
import type { AudioPreview, PreviewState, Score, Sound } from './index.ts';

const silent: PreviewState = { status: 'silent', trouble: null };
const noListeners = () => () => undefined;
const isSilent = () => silent;

export interface PreviewHandle extends PreviewState {
  /** Starts or stops. Belongs in the handler of a press or a key. */
  readonly toggle: () => void;
  /** There once play has been pressed. */
  readonly preview: AudioPreview | null;
}

/**
 * Ties the sound to the page: it starts with a press, follows the wave, the voice and the score while it plays, and
 * ends with the page.
 *
 * @param hearing name of the voice that is heard
 * @param isNear whether play is likely to be pressed, so that the player is fetched ahead of that
 */
export function usePreview(
  sound: Sound,
  hearing: string,
  volumeDb: number,
  score: Score | null = null,
  isNear = true,
): PreviewHandle {
  const [preview, setPreview] = useState<AudioPreview | null>(null);
  const [openTrouble, setOpenTrouble] = useState<string | null>(null);
  const opened = useRef<AudioPreview | null>(null);
  const isOpening = useRef(false);
  const state = useSyncExternalStore(preview?.subscribe ?? noListeners, preview?.state ?? isSilent);

  useEffect(() => (isNear ? fetchAhead() : undefined), [isNear]);
  useEffect(
    () => () => {
      opened.current?.close();
      opened.current = null;
      setPreview(null);
    },
    [],
  );

  // The voice before the sound: a sound with other voices is then taken up with the right one.
  useEffect(() => preview?.hear(hearing), [preview, hearing]);
  useEffect(() => preview?.change(sound), [preview, sound]);
  useEffect(() => preview?.perform(score), [preview, score]);
  useEffect(() => preview?.setVolume(volumeDb), [preview, volumeDb]);

  const toggle = useCallback(() => {
    const there = opened.current;
    if (there !== null) {
      if (there.state().status === 'silent') void there.play(sound, hearing, score);
      else there.stop();
      return;
    }
    if (isOpening.current) return;
    isOpening.current = true;
    void openPreview()
      .then((fresh) => {
        opened.current = fresh;
        fresh.setVolume(volumeDb);
        setPreview(fresh);
        setOpenTrouble(null);
        return fresh.play(sound, hearing, score);
      })
      .catch((error: unknown) => setOpenTrouble(error instanceof Error ? error.message : String(error)))
      .finally(() => {
        isOpening.current = false;
      });
  }, [sound, hearing, volumeDb, score]);

  return { status: state.status, trouble: state.trouble ?? openTrouble, toggle, preview };
}

/** Fetches the player while the page has nothing else to do, so that a press finds it there. */
function fetchAhead(): () => void {
  const fetchPlayer = () =>
    void import('./player.ts').then(({ fetchWorklet }) => fetchWorklet()).catch(() => undefined);
  if (typeof requestIdleCallback !== 'function') {
    const timer = setTimeout(fetchPlayer, 1_000);
    return () => clearTimeout(timer);
  }
  const handle = requestIdleCallback(fetchPlayer, { timeout: 3_000 });
  return () => cancelIdleCallback(handle);
}
