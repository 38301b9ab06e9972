import { levelCap, outputGain, volumeRangeDb } from './levels.ts';

/** Frames that the meters look at: 341 ms at 48 kHz, 2.9 Hz a bin. */
export const meterFrames = 16_384;

/**
 * The way from the player to the loudspeaker: input → fade → volume → device → level cap → analyser → destination.
 * What stands for the device is put in by `deviceWay`.
 */
export interface PreviewGraph {
  /** The player joins here, full scale ±1. */
  readonly input: AudioNode;
  /** 0 while silent, 1 while playing. */
  readonly fade: GainNode;
  readonly volume: GainNode;
  readonly cap: AudioNode;
  readonly analyser: AnalyserNode;
}

/** Builds the graph in any context, so that an offline one can prove its levels. */
export function buildGraph(context: BaseAudioContext): PreviewGraph {
  const fade = new GainNode(context, { gain: 0 });
  const volume = new GainNode(context, { gain: outputGain(volumeRangeDb.start) });
  const cap = new WaveShaperNode(context, { curve: capCurve(), oversample: 'none' });
  const analyser = new AnalyserNode(context, { fftSize: meterFrames, smoothingTimeConstant: 0 });
  fade.connect(volume);
  cap.connect(analyser).connect(context.destination);
  return { input: fade, fade, volume, cap, analyser };
}

/** Straight between −cap and cap, which the grid of five points hits exactly (cap = ½), level beyond. */
function capCurve(): Float32Array<ArrayBuffer> {
  return new Float32Array([-levelCap, -levelCap, 0, levelCap, levelCap]);
}
