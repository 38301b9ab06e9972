import type { PreviewGraph } from './graph.ts';
import { glide, glideSeconds } from './ramps.ts';

/** The way through the response of where it will be heard. */
export interface DeviceWay {
  /** @param impulse FIR at the context's rate; `null` for the straight way */
  put(impulse: Float32Array | null): void;
}

interface Way {
  readonly first: AudioNode;
  readonly gain: GainNode;
}

/** Puts a response between the volume and the cap; each change is a crossfade. */
export function deviceWay(context: BaseAudioContext, { volume, cap }: PreviewGraph): DeviceWay {
  const openWay = (impulse: Float32Array | null, level: number): Way => {
    const gain = new GainNode(context, { gain: level });
    const first = impulse === null ? gain : convolverOf(context, impulse);
    if (first !== gain) first.connect(gain);
    volume.connect(first);
    gain.connect(cap);
    return { first, gain };
  };
  const closeWay = ({ first, gain }: Way) => {
    volume.disconnect(first);
    first.disconnect();
    gain.disconnect();
  };

  let current = openWay(null, 1);
  let put: Float32Array | null = null;
  return {
    put(impulse) {
      if (impulse === put) return;
      put = impulse;
      const before = current;
      current = openWay(impulse, 0);
      glide(current.gain.gain, 1, context.currentTime, glideSeconds.crossfade);
      glide(before.gain.gain, 0, context.currentTime, glideSeconds.crossfade);
      // Ten time constants are −87 dB. A context that rests meanwhile is silent in any case.
      setTimeout(() => closeWay(before), 1000 * 10 * glideSeconds.crossfade);
    },
  };
}

function convolverOf(context: BaseAudioContext, impulse: Float32Array): ConvolverNode {
  const { sampleRate } = context;
  const buffer = new AudioBuffer({ length: impulse.length, numberOfChannels: 1, sampleRate });
  buffer.copyToChannel(new Float32Array(impulse), 0);
  return new ConvolverNode(context, {
    buffer,
    disableNormalization: true,
    channelCount: 1,
    channelCountMode: 'explicit',
  });
}
