/**
 * Opens an audio context. Called in the press that asks for sound and not before, as browsers let a page sound only
 * from a gesture on. It stands apart from the rest of the preview, which is fetched after the press.
 *
 * @returns `null` where the browser has no Web Audio, or refuses another context
 */
export function openAudioContext(): AudioContext | null {
  if (typeof AudioContext !== 'function') return null;
  try {
    return new AudioContext({ latencyHint: 'interactive' });
  } catch {
    return null;
  }
}
