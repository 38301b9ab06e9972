import type { PlayerMessage, PlayerReport } from './player-messages.ts';
import { playerName } from './player-name.ts';
import { Mixer } from './worklet/mixer.ts';

// The shell about the mixer; what it plays is computed there, free of the browser. The library for pages does not
// declare what an audio worklet's global scope has (Web Audio API 1.1).
declare const sampleRate: number;
declare const currentFrame: number;
declare abstract class AudioWorkletProcessor {
  readonly port: MessagePort;
}
declare function registerProcessor(
  name: string,
  processor: new (options: { processorOptions: readonly PlayerMessage[] }) => AudioWorkletProcessor,
): void;

registerProcessor(
  playerName,
  class extends AudioWorkletProcessor {
    readonly #mixer = new Mixer(sampleRate);

    constructor({ processorOptions }: { processorOptions: readonly PlayerMessage[] }) {
      super();
      this.port.onmessage = ({ data }: MessageEvent<PlayerMessage>) => this.#mixer.take(data, currentFrame);
      for (const message of processorOptions) this.#mixer.take(message, currentFrame);
    }

    process(_inputs: unknown, [[out]]: Float32Array[][]): boolean {
      const ended = this.#mixer.process(out, currentFrame);
      if (ended !== null) this.port.postMessage({ kind: 'ended', request: ended } satisfies PlayerReport);
      // Kept between two sounds.
      return true;
    }
  },
);
