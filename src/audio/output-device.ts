/**
 * Whether the browser lists its outputs and lists none. It lists them only where a context can choose its output; there
 * it runs a context without a device too, in silence, and nothing else would tell.
 */
export async function lacksOutputDevice(context: AudioContext): Promise<boolean> {
  // Not on plain http off the own machine.
  const { mediaDevices } = navigator as { mediaDevices?: MediaDevices };
  if (!('setSinkId' in context) || mediaDevices === undefined) return false;
  try {
    const devices = await mediaDevices.enumerateDevices();
    return !devices.some(({ kind }) => kind === 'audiooutput');
  } catch {
    return false;
  }
}
