import type { Score, Sound } from '../../shared/listening/index.ts';
import { deviceWay } from '../../src/audio/device-way.ts';
import { buildGraph } from '../../src/audio/graph.ts';
import { outputGain } from '../../src/audio/levels.ts';
import { PlayerNode } from '../../src/audio/player-node.ts';
import { prepareSound } from '../../src/audio/prepare-sound.ts';
import { glideFromSilence, glideSeconds } from '../../src/audio/ramps.ts';

// Bundled by tests/support/offline-page.ts and run in a blank page: the player's own graph and its worklet in an offline
// context.

export interface OfflineOrder {
  readonly sound: Sound;
  readonly hearing: string;
  readonly score?: Score;
  readonly contextRateHz: number;
  readonly seconds: number;
  readonly volumeDb: number;
  /** FIR of where it is heard, at the context's rate. */
  readonly impulse?: Float32Array;
}

async function renderOffline(order: OfflineOrder): Promise<Float32Array> {
  const { sound, hearing, score = null, contextRateHz, seconds, volumeDb, impulse } = order;
  const context = new OfflineAudioContext(1, Math.round(seconds * contextRateHz), contextRateHz);
  const graph = buildGraph(context);
  const device = deviceWay(context, graph);
  if (impulse !== undefined) device.put(impulse);
  graph.volume.gain.value = outputGain(volumeDb);
  glideFromSilence(graph.fade.gain, 0, glideSeconds.fadeIn);
  const program = prepareSound(sound, score, contextRateHz);
  await PlayerNode.open(context, graph.input, undefined, [
    { kind: 'start', program, hearing, score, request: 1 },
  ]);
  return (await context.startRendering()).getChannelData(0);
}

/**
 * Share of a core that the player takes: time to render over time rendered, the player alone in the context. The least
 * of some runs, as nothing but other work makes a run longer.
 */
async function measureLoad(order: OfflineOrder, runs: number): Promise<number> {
  const { sound, hearing, contextRateHz, seconds } = order;
  let least = Infinity;
  for (let run = 0; run < runs; run += 1) {
    const context = new OfflineAudioContext(1, Math.round(seconds * contextRateHz), contextRateHz);
    const program = prepareSound(sound, null, contextRateHz);
    await PlayerNode.open(context, context.destination, undefined, [
      { kind: 'start', program, hearing, score: null, request: 1 },
    ]);
    const begun = performance.now();
    await context.startRendering();
    least = Math.min(least, (performance.now() - begun) / 1000 / seconds);
  }
  return least;
}

const offline = { renderOffline, measureLoad };

declare global {
  interface Window {
    offline: typeof offline;
  }
}

window.offline = offline;
