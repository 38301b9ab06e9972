import type { PlayerMessage, PlayerReport } from './player-messages.ts';
import workletUrl from './player.worklet.ts?worker&url';
import { playerName } from './player-name.ts';

const overPlainHttp =
  'Over plain http the browser keeps its audio worklet away, without which nothing can be played. Open this page over https, or at localhost on the machine that serves it, then press play again.';
const noWorklet = 'This browser has no audio worklet, without which nothing can be played.';

/** Why a context has no place for the player, in words for the screen; `null` where it has one. */
export function whyNoWorklet(context: BaseAudioContext): string | null {
  // Absent on pages that are no secure context (Web Audio API 1.1, AudioWorklet is [SecureContext]).
  const { audioWorklet } = context as { audioWorklet?: AudioWorklet };
  if (audioWorklet !== undefined) return null;
  return globalThis.isSecureContext ? noWorklet : overPlainHttp;
}

/** Has the browser keep the audio thread's part, before there is a context that could take it in. */
export async function fetchWorklet(): Promise<void> {
  await (await fetch(workletUrl)).arrayBuffer();
}

export interface PlayerEvents {
  /** One pass is over; `request` is that of its `start`. */
  readonly onEnded: (request: number) => void;
  /** The audio thread's part has thrown; the node is silent from then on. */
  readonly onBroken: () => void;
}

/** The audio thread's part of the player, as a node of a context. */
export class PlayerNode {
  readonly #node: AudioWorkletNode;

  private constructor(
    context: BaseAudioContext,
    output: AudioNode,
    first: readonly PlayerMessage[],
    events?: PlayerEvents,
  ) {
    this.#node = new AudioWorkletNode(context, playerName, {
      numberOfInputs: 0,
      outputChannelCount: [1],
      processorOptions: first,
    });
    this.#node.port.onmessage = ({ data }: MessageEvent<PlayerReport>) => events?.onEnded(data.request);
    this.#node.onprocessorerror = () => {
      this.#node.disconnect();
      events?.onBroken();
    };
    this.#node.connect(output);
  }

  /**
   * Takes the player into a context and connects it.
   *
   * @param first is told before the first quantum: an offline context would not wait for a message
   * @throws where it cannot be fetched
   */
  static async open(
    context: BaseAudioContext,
    output: AudioNode,
    events?: PlayerEvents,
    first: readonly PlayerMessage[] = [],
  ): Promise<PlayerNode> {
    await context.audioWorklet.addModule(workletUrl);
    return new PlayerNode(context, output, first, events);
  }

  tell(message: PlayerMessage): void {
    this.#node.port.postMessage(message);
  }
}
