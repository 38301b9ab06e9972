import type { LoopPlan } from './loop-plan.ts';
import { glide, glideSeconds } from './ramps.ts';
import type { Hearing, RenderedSound } from './sound.ts';

/**
 * The ideal curve and the quantised table sounding together, frame by frame in step, each behind its own gain: going
 * over from one to the other is a crossfade of two waves in phase, with no gap and no dip.
 */
export class Voices {
  readonly #sources: { ideal: AudioBufferSourceNode; table: AudioBufferSourceNode };
  readonly #gains: { ideal: GainNode; table: GainNode };
  /** The pair as a whole, for going over to the next pair. */
  readonly #together: GainNode;
  readonly #rendered: RenderedSound;
  readonly #startFrame: number;
  readonly #context: BaseAudioContext;

  /**
   * @param startFrame frame of the context's clock at which the pair starts
   * @param offsetFrames frame of the loop with which it starts
   * @param isFadedIn whether the pair comes in from silence over a crossfade, rather than whole
   */
  constructor(
    context: BaseAudioContext,
    output: AudioNode,
    rendered: RenderedSound,
    hearing: Hearing,
    {
      startFrame,
      offsetFrames = 0,
      isFadedIn = false,
    }: { startFrame: number; offsetFrames?: number; isFadedIn?: boolean },
  ) {
    this.#context = context;
    this.#rendered = rendered;
    this.#startFrame = startFrame - offsetFrames;
    // Whole frames: a start between two frames would be interpolated and lose its treble.
    const at = startFrame / context.sampleRate;
    this.#together = new GainNode(context, { gain: isFadedIn ? 0 : 1 });
    if (isFadedIn) glide(this.#together.gain, 1, at, glideSeconds.crossfade);
    this.#together.connect(output);
    this.#gains = {
      ideal: new GainNode(context, { gain: hearing === 'ideal' ? 1 : 0 }),
      table: new GainNode(context, { gain: hearing === 'table' ? 1 : 0 }),
    };
    this.#sources = {
      ideal: this.#source(rendered.ideal, this.#gains.ideal),
      table: this.#source(rendered.table, this.#gains.table),
    };
    this.#sources.ideal.start(at, offsetFrames / context.sampleRate);
    this.#sources.table.start(at, offsetFrames / context.sampleRate);
  }

  #source(frames: Float32Array<ArrayBuffer>, gain: GainNode): AudioBufferSourceNode {
    const buffer = new AudioBuffer({
      length: frames.length,
      numberOfChannels: 1,
      sampleRate: this.#context.sampleRate,
    });
    buffer.copyToChannel(frames, 0);
    const source = new AudioBufferSourceNode(this.#context, {
      buffer,
      loop: this.#rendered.plan !== undefined,
    });
    source.connect(gain).connect(this.#together);
    return source;
  }

  /** Calls back once, when both have ended by themselves or by `stop`. */
  onEnded(callback: () => void): void {
    this.#sources.table.addEventListener('ended', callback, { once: true });
  }

  hear(hearing: Hearing, at: number): void {
    glide(this.#gains.ideal.gain, hearing === 'ideal' ? 1 : 0, at, glideSeconds.crossfade);
    glide(this.#gains.table.gain, hearing === 'table' ? 1 : 0, at, glideSeconds.crossfade);
  }

  /** Frame at which a loop of another plan goes on, from `frame` of the context's clock, where this one would be. */
  continuedIn(plan: LoopPlan, frame: number): number {
    const own = this.#rendered.plan;
    if (own === undefined) return 0;
    const elapsed = Math.max(0, frame - this.#startFrame) % own.frames;
    if (own.frames === plan.frames && own.rounds === plan.rounds) return elapsed;
    const phase = ((elapsed * own.rounds) % own.frames) / own.frames;
    return Math.round((phase * plan.frames) / plan.rounds) % plan.frames;
  }

  /** Gives way to the next pair over a crossfade that starts at `at` (seconds). */
  giveWay(at: number): void {
    glide(this.#together.gain, 0, at, glideSeconds.crossfade);
    this.stop(at + 10 * glideSeconds.crossfade);
  }

  /** Ends both at a time in seconds and lets go of the graph. */
  stop(at: number): void {
    this.onEnded(() => this.#together.disconnect());
    this.#sources.ideal.stop(at);
    this.#sources.table.stop(at);
  }
}
