import { linesOf } from '../../shared/dft/index.ts';
import { buildGraph } from '../../src/audio/graph.ts';
import { outputGain } from '../../src/audio/levels.ts';
import { glideFromSilence, glideSeconds } from '../../src/audio/ramps.ts';
import { renderSound, type Sound } from '../../src/audio/sound.ts';
import { Voices } from '../../src/audio/voices.ts';

// Bundled by listen-levels.spec.ts and run in a blank page: the player's own graph in an offline context.

export interface OfflineOrder {
  values: number[];
  mode: Sound['mode'];
  range: Sound['range'];
  sampleRateHz: number;
  contextRateHz: number;
  seconds: number;
  volumeDb: number;
}

export interface OfflineLine {
  hz: number;
  amplitude: number;
}

export interface OfflineResult {
  /** Peaks of successive 5 ms, from the start. */
  envelope: number[];
  largestStep: number;
  /** Spectrum of the last second, Blackman–Harris window: every line stronger than −120 dBFS. */
  lines: OfflineLine[];
}

async function renderOffline(order: OfflineOrder): Promise<OfflineResult> {
  const { contextRateHz } = order;
  const context = new OfflineAudioContext(1, Math.round(order.seconds * contextRateHz), contextRateHz);
  const graph = buildGraph(context);
  graph.volume.gain.value = outputGain(order.volumeDb);
  glideFromSilence(graph.fade.gain, 0, glideSeconds.fadeIn);
  const values = Float64Array.from(order.values);
  const { mode, range, sampleRateHz } = order;
  const rendered = renderSound({ cycle: values, values, mode, range, sampleRateHz }, contextRateHz);
  new Voices(context, graph.input, rendered, 'table', { startFrame: Math.round(0.02 * contextRateHz) });
  const heard = (await context.startRendering()).getChannelData(0);

  const block = Math.round(0.005 * contextRateHz);
  const envelope: number[] = [];
  for (let first = 0; first + block <= heard.length; first += block) {
    envelope.push(
      heard.subarray(first, first + block).reduce((peak, value) => Math.max(peak, Math.abs(value)), 0),
    );
  }
  let largestStep = 0;
  for (let i = 1; i < heard.length; i += 1)
    largestStep = Math.max(largestStep, Math.abs(heard[i] - heard[i - 1]));
  return {
    envelope,
    largestStep,
    lines: linesWithin(heard.subarray(heard.length - contextRateHz), contextRateHz),
  };
}

/** One bin a hertz. A line's amplitude is read from its nearest bin: the window is flat within 0.83 dB, so tones are whole hertz. */
function linesWithin(second: Float32Array, rateHz: number): OfflineLine[] {
  const coefficients = [0.35875, 0.48829, 0.14128, 0.01168];
  const windowed = Float64Array.from(second, (value, i) => {
    const turn = (2 * Math.PI * i) / rateHz;
    const window = coefficients.reduce((sum, c, k) => sum + (k % 2 === 0 ? c : -c) * Math.cos(k * turn), 0);
    return (window / coefficients[0]) * value;
  });
  const { re, im } = linesOf(windowed);
  const amplitudes = re.map((value, k) => (2 * Math.hypot(value, im[k])) / rateHz);
  const lines: OfflineLine[] = [];
  amplitudes.forEach((amplitude, hz) => {
    const isPeak = amplitude > amplitudes[hz - 1] && amplitude >= amplitudes[hz + 1];
    if (isPeak && amplitude > 1e-6) lines.push({ hz, amplitude });
  });
  return lines;
}

declare global {
  interface Window {
    renderOffline: typeof renderOffline;
  }
}

window.renderOffline = renderOffline;
