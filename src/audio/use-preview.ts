import { useCallback, useEffect, useRef, useState, useSyncExternalStore } from 'react';
import { openPreview } from './open-preview.ts';
import type { AudioPreview, PreviewState, Score, Sound } from './index.ts';

const silent: PreviewState = { status: 'silent', trouble: null };
const noListeners = () => () => undefined;
const isSilent = () => silent;

export interface PreviewHandle extends PreviewState {
  /** Starts or stops. Belongs in the handler of a press or a key. */
  readonly toggle: () => void;
  /**
   * Makes ready what a press would wait for, in silence: for when one is about to come. Does nothing before the page's
   * visitor has pressed anything at all, as browsers let no page open its output before that.
   */
  readonly makeReady: () => void;
  /** There once play has been pressed, or is about to be. */
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
  const opening = useRef<Promise<AudioPreview> | null>(null);
  const isAsked = useRef(false);
  const isGone = useRef(false);
  const state = useSyncExternalStore(preview?.subscribe ?? noListeners, preview?.state ?? isSilent);

  useEffect(() => (isNear ? fetchAhead() : undefined), [isNear]);
  useEffect(() => {
    isGone.current = false;
    return () => {
      isGone.current = true;
      opened.current?.close();
      opened.current = opening.current = null;
      setPreview(null);
    };
  }, []);

  // The voice before the sound: a sound with other voices is then taken up with the right one.
  useEffect(() => preview?.hear(hearing), [preview, hearing]);
  useEffect(() => preview?.change(sound), [preview, sound]);
  useEffect(() => preview?.perform(score), [preview, score]);
  useEffect(() => preview?.setVolume(volumeDb), [preview, volumeDb]);

  const open = useCallback((): Promise<AudioPreview> => {
    const fresh = (opening.current ??= openPreview().then((made) => {
      if (isGone.current) {
        made.close();
        throw new Error('The page has been left.');
      }
      opened.current = made;
      made.setVolume(volumeDb);
      setPreview(made);
      return made;
    }));
    // The next press tries again.
    fresh.catch(() => {
      if (opening.current === fresh) opening.current = null;
    });
    return fresh;
  }, [volumeDb]);

  const makeReady = useCallback(() => {
    const { userActivation } = navigator as { userActivation?: UserActivation };
    if (opened.current !== null || userActivation?.hasBeenActive !== true) return;
    // What fails here is told when play is pressed.
    open().then(
      (fresh) => fresh.rest(),
      () => undefined,
    );
  }, [open]);

  const toggle = useCallback(() => {
    const there = opened.current;
    if (there !== null && !isAsked.current) {
      if (there.state().status === 'silent') void there.play(sound, hearing, score);
      else there.stop();
      return;
    }
    if (isAsked.current) return;
    isAsked.current = true;
    void open()
      .then((fresh) => {
        setOpenTrouble(null);
        isAsked.current = false;
        return fresh.play(sound, hearing, score);
      })
      .catch((error: unknown) => {
        if (!isGone.current) setOpenTrouble(error instanceof Error ? error.message : String(error));
      })
      .finally(() => {
        isAsked.current = false;
      });
  }, [open, sound, hearing, score]);

  return { status: state.status, trouble: state.trouble ?? openTrouble, toggle, makeReady, preview };
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
