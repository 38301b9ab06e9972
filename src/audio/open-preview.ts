import { openAudioContext } from './open-context.ts';
import workletUrl from './player.worklet.ts?worker&url';
import type { AudioPreview } from './preview.ts';

/**
 * Opens a preview. Called in a press: the context is made within it, and only then is the rest waited for.
 *
 * @throws Error in words for the screen
 */
export async function openPreview(): Promise<AudioPreview> {
  const context = openAudioContext();
  if (context === null)
    throw new Error('This browser cannot play: it has no Web Audio, or too many pages use it already.');
  // The context's clock runs from here on: what it has to take in is on its way at once. Trouble with it is told later.
  const { audioWorklet } = context as { audioWorklet?: AudioWorklet };
  void audioWorklet?.addModule(workletUrl).catch(() => undefined);
  try {
    const { AudioPreview } = await import('./player.ts');
    return new AudioPreview(context);
  } catch {
    void context.close();
    throw new Error('The player could not be fetched. Check the connection, then press play again.');
  }
}
