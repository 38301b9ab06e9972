import { buildGraph, type PreviewGraph } from './graph.ts';
import { outputGain } from './levels.ts';
import { createMeter, type MeterReading } from './meter.ts';
import { lacksOutputDevice } from './output-device.ts';
import { glide, glideFromSilence, glideSeconds, glideToSilence } from './ramps.ts';
import { renderSound, whyUnplayable, type Hearing, type Sound } from './sound.ts';
import { Voices } from './voices.ts';

export interface PreviewState {
  readonly status: 'silent' | 'starting' | 'playing';
  /** What keeps the sound away, in words for the screen. It can play with nothing there to be heard through. */
  readonly trouble: string | null;
}

/** Longest wait for the browser to let the context run. */
const patienceMs = 2_000;
/** Between two changes of a sounding wave: longer than a crossfade, so that never more than two pairs sound. */
const changeEveryMs = 80;
/** A wave that takes long to render is taken up less often, so that the page keeps most of its time. */
const restPerWork = 4;
/** From a request to its sound; enough for the audio thread to see what was scheduled. */
const leadSeconds = 0.03;
/** Before one pass: the output is open again by then, even when a sound was just fading out. */
const passLeadSeconds = 0.08;

const noDevice =
  'The browser finds no output device: it plays, but nothing can be heard. Connect one, then press play again.';
const notStarted =
  'The browser has not started its audio: this page may not be allowed to make sound, or no output device answers. Check both, then press play again.';
const hasStopped = 'The browser has stopped its audio: the output device may have gone. Press play to go on.';

const silent: PreviewState = { status: 'silent', trouble: null };

/**
 * Plays a wave as a loop or once through. It never starts by itself: `play` belongs in the handler of a press.
 * Listeners are told of every change of `state`.
 */
export class AudioPreview {
  readonly #context: AudioContext;
  readonly #graph: PreviewGraph;
  readonly #readMeter: () => MeterReading;
  readonly #listeners = new Set<() => void>();
  #state: PreviewState = silent;
  #voices: Voices | null = null;
  /** What fades out with the output, or has ended so. */
  #ending: Voices | null = null;
  #sound: Sound | null = null;
  #hearing: Hearing = 'table';
  #changeTimer: ReturnType<typeof setTimeout> | undefined;
  #pauseMs = changeEveryMs;
  #sleepTimer: ReturnType<typeof setTimeout> | undefined;
  /** Counts requests, so that what was awaited for an older one is dropped. */
  #request = 0;

  constructor(context: AudioContext) {
    this.#context = context;
    this.#graph = buildGraph(context);
    this.#readMeter = createMeter(this.#graph.analyser);
    context.addEventListener('statechange', () => this.#onContextState());
    // The output could not be opened, or was lost.
    context.addEventListener('error', () => this.#fallSilent(hasStopped));
  }

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  readonly state = (): PreviewState => this.#state;

  /** Rate at which this browser plays, in hertz. */
  get contextRateHz(): number {
    return this.#context.sampleRate;
  }

  /** Starts a sound from silence, quietly; a sound that plays already makes way for it. */
  async play(sound: Sound, hearing: Hearing): Promise<void> {
    const request = (this.#request += 1);
    const trouble = whyUnplayable(sound, this.#context.sampleRate);
    if (trouble !== null) return this.#fallSilent(trouble);
    this.#sound = sound;
    this.#hearing = hearing;
    clearTimeout(this.#sleepTimer);
    this.#become({ status: 'starting', trouble: null });
    const isAwake = await this.#wake();
    if (request !== this.#request) return;
    if (!isAwake) return this.#fallSilent(notStarted);
    this.#begin(this.#sound);
    this.#become({ status: 'playing', trouble: null });
    const isUnheard = await lacksOutputDevice(this.#context);
    if (isUnheard && request === this.#request && this.#state.status === 'playing') {
      this.#become({ status: 'playing', trouble: noDevice });
    }
  }

  /** Fades out and lets the audio device go. */
  stop(): void {
    this.#request += 1;
    if (this.#state.status !== 'silent') this.#fallSilent(null);
  }

  /** Takes up a changed wave, rate or length while the sound plays; the tone's phase goes on. */
  change(sound: Sound): void {
    if (this.#state.status === 'silent' || this.#sound === null) return;
    if (sound.mode !== this.#sound.mode) return this.stop();
    this.#sound = sound;
    if (sound.mode === 'once' || this.#changeTimer !== undefined) return;
    this.#changeTimer = setTimeout(() => {
      this.#changeTimer = undefined;
      const begun = performance.now();
      this.#goOver();
      this.#pauseMs = Math.max(changeEveryMs, restPerWork * (performance.now() - begun));
    }, this.#pauseMs);
  }

  /** Goes over to the other voice, in phase. */
  hear(hearing: Hearing): void {
    if (hearing === this.#hearing) return;
    this.#hearing = hearing;
    this.#voices?.hear(hearing, this.#context.currentTime);
  }

  /** @param volumeDb in `volumeRangeDb` */
  setVolume(volumeDb: number): void {
    glide(this.#graph.volume.gain, outputGain(volumeDb), this.#context.currentTime, glideSeconds.volume);
  }

  /** What sounds now; `null` while nothing does. */
  meter(): MeterReading | null {
    return this.#state.status === 'playing' ? this.#readMeter() : null;
  }

  /** Stops and gives the context back. The preview cannot be used afterwards. */
  close(): void {
    this.stop();
    clearTimeout(this.#sleepTimer);
    setTimeout(() => void this.#context.close(), 1000 * 10 * glideSeconds.fadeOut);
  }

  #become(state: PreviewState): void {
    this.#state = state;
    for (const listener of this.#listeners) listener();
  }

  #frameAt(seconds: number): number {
    return Math.ceil(seconds * this.#context.sampleRate);
  }

  async #wake(): Promise<boolean> {
    const context = this.#context;
    const deadline = performance.now() + patienceMs;
    // Where no device answers, some browsers leave this promise open for ever.
    void context.resume().catch(() => undefined);
    const before = context.currentTime;
    while (performance.now() < deadline) {
      if (context.state === 'running' && context.currentTime > before) return true;
      await new Promise((resolve) => setTimeout(resolve, 5));
    }
    return false;
  }

  /** Renders first and then looks at the clock, so that the start lies ahead however long the rendering took. */
  #begin(sound: Sound): void {
    const rendered = renderSound(sound, this.#context.sampleRate);
    const now = this.#context.currentTime;
    this.#voices?.giveWay(now);
    this.#ending?.giveWay(now);
    // One pass carries its own fades, fitted to its length; a loop comes up with the output.
    const isPass = sound.mode === 'once';
    const startFrame = this.#frameAt(now + (isPass ? passLeadSeconds : leadSeconds));
    const { gain } = this.#graph.fade;
    if (isPass) glideFromSilence(gain, now, glideSeconds.crossfade);
    else glideFromSilence(gain, startFrame / this.#context.sampleRate, glideSeconds.fadeIn);
    const voices = new Voices(this.#context, this.#graph.input, rendered, this.#hearing, { startFrame });
    this.#voices = voices;
    if (!isPass) return;
    voices.onEnded(() => {
      if (this.#voices === voices) this.#fallSilent(null);
    });
  }

  #goOver(): void {
    const before = this.#voices;
    const sound = this.#sound;
    if (before === null || sound === null || this.#state.status !== 'playing') return;
    const trouble = whyUnplayable(sound, this.#context.sampleRate);
    if (trouble !== null) return this.#fallSilent(trouble);
    const rendered = renderSound(sound, this.#context.sampleRate);
    if (rendered.plan === undefined) return;
    const startFrame = this.#frameAt(this.#context.currentTime + leadSeconds);
    this.#voices = new Voices(this.#context, this.#graph.input, rendered, this.#hearing, {
      startFrame,
      offsetFrames: before.continuedIn(rendered.plan, startFrame),
      isFadedIn: true,
    });
    before.giveWay(startFrame / this.#context.sampleRate);
  }

  #fallSilent(trouble: string | null): void {
    const now = this.#context.currentTime;
    const silentAt = glideToSilence(this.#graph.fade.gain, now, glideSeconds.fadeOut);
    this.#voices?.stop(silentAt);
    this.#ending = this.#voices ?? this.#ending;
    this.#voices = null;
    clearTimeout(this.#changeTimer);
    this.#changeTimer = undefined;
    clearTimeout(this.#sleepTimer);
    this.#sleepTimer = setTimeout(() => void this.#context.suspend(), 1000 * (silentAt - now) + 100);
    this.#become(trouble === null ? silent : { status: 'silent', trouble });
  }

  #onContextState(): void {
    if (this.#context.state === 'running' || this.#state.status !== 'playing') return;
    this.#fallSilent(hasStopped);
  }
}
