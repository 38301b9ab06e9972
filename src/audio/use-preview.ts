import { useCallback, useEffect, useRef, useState, useSyncExternalStore } from 'react';
import { openAudioContext, type AudioPreview, type Hearing, type PreviewState, type Sound } from './index.ts';

const silent: PreviewState = { status: 'silent', trouble: null };
const noListeners = () => () => undefined;
const isSilent = () => silent;

export interface PreviewHandle extends PreviewState {
  /** Starts or stops. Belongs in the handler of a press or a key. */
  toggle: () => void;
  /** There once play has been pressed. */
  preview: AudioPreview | null;
}

/** Ties the sound to the page: it starts with a press, follows the wave while it plays, and ends with the page. */
export function usePreview(sound: Sound, hearing: Hearing, volumeDb: number): PreviewHandle {
  const [preview, setPreview] = useState<AudioPreview | null>(null);
  const [openTrouble, setOpenTrouble] = useState<string | null>(null);
  const opened = useRef<AudioPreview | null>(null);
  const isOpening = useRef(false);
  const state = useSyncExternalStore(preview?.subscribe ?? noListeners, preview?.state ?? isSilent);

  useEffect(
    () => () => {
      opened.current?.close();
      opened.current = null;
      setPreview(null);
    },
    [],
  );

  useEffect(() => preview?.change(sound), [preview, sound]);
  useEffect(() => preview?.hear(hearing), [preview, hearing]);
  useEffect(() => preview?.setVolume(volumeDb), [preview, volumeDb]);

  const toggle = useCallback(() => {
    const there = opened.current;
    if (there !== null) {
      if (there.state().status === 'silent') void there.play(sound, hearing);
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
        return fresh.play(sound, hearing);
      })
      .catch((error: unknown) => setOpenTrouble(error instanceof Error ? error.message : String(error)))
      .finally(() => {
        isOpening.current = false;
      });
  }, [sound, hearing, volumeDb]);

  return { status: state.status, trouble: state.trouble ?? openTrouble, toggle, preview };
}

/** The context is made within the press itself; only then is the rest waited for. */
async function openPreview(): Promise<AudioPreview> {
  const context = openAudioContext();
  if (context === null)
    throw new Error('This browser cannot play: it has no Web Audio, or too many pages use it already.');
  try {
    const { AudioPreview } = await import('./player.ts');
    return new AudioPreview(context);
  } catch {
    void context.close();
    throw new Error('The player could not be fetched. Check the connection, then press play again.');
  }
}
