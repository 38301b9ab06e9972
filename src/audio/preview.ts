import { deviceWay, type DeviceWay } from './device-way.ts';
import { buildGraph, type PreviewGraph } from './graph.ts';
import { outputGain } from './levels.ts';
import { createMeter, type MeterReading } from './meter.ts';
import { lacksOutputDevice } from './output-device.ts';
import { PlayerNode, whyNoWorklet } from './player-node.ts';
import { Preparer } from './preparer.ts';
import { glide, glideFromSilence, glideSeconds, glideToSilence } from './ramps.ts';
import type { Score, Sound } from './sound.ts';
import { createSpectrum } from './spectrum.ts';
import { whyUnplayable } from './why-unplayable.ts';

export interface PreviewState {
  readonly status: 'silent' | 'starting' | 'playing';
  /** What keeps the sound away, in words for the screen. It can play with nothing there to be heard through. */
  readonly trouble: string | null;
}

/** Longest wait for the browser to let the context run. */
const patienceMs = 2_000;
/** Between two changes of a sounding wave: a crossfade and a little more, so that few pairs sound at once. */
const changeEveryMs = 20;
/** A wave that takes long to make ready is taken up less often, so that the page keeps most of its time. */
const restPerWork = 4;

const noDevice =
  'The browser finds no output device: it plays, but nothing can be heard. Connect one, then press play again.';
const notStarted =
  'The browser has not started its audio: this page may not be allowed to make sound, or no output device answers. Check both, then press play again.';
const hasStopped = 'The browser has stopped its audio: the output device may have gone. Press play to go on.';
const notFetched = 'The player could not be fetched. Check the connection, then press play again.';
const hasFailed = 'The player has met an error of its own and stopped. Press play to begin anew.';

const silent: PreviewState = { status: 'silent', trouble: null };

/**
 * Plays the voices of a sound in step, one of them heard at a time. It never starts by itself: `play` belongs in the
 * handler of a press. Listeners are told of every change of `state`.
 */
export class AudioPreview {
  readonly #context: AudioContext;
  readonly #graph: PreviewGraph;
  readonly #device: DeviceWay;
  readonly #readMeter: () => MeterReading;
  readonly #readSpectrum: (levelsDb: Float32Array) => number;
  readonly #preparer: Preparer;
  readonly #listeners = new Set<() => void>();
  #state: PreviewState = silent;
  /** Fetched and opened with the context, then kept. */
  #node: Promise<PlayerNode> | null = null;
  #player: PlayerNode | null = null;
  #sound: Sound | null = null;
  /** What the audio thread has, or is about to have. */
  #sounding: Sound | null = null;
  #hearing = '';
  #score: Score | null = null;
  #changeTimer: ReturnType<typeof setTimeout> | undefined;
  #isChanging = false;
  #mayChangeAt = 0;
  #sleepTimer: ReturnType<typeof setTimeout> | undefined;
  /** Counts requests, so that what was awaited for an older one is dropped. */
  #request = 0;

  constructor(context: AudioContext) {
    this.#context = context;
    this.#graph = buildGraph(context);
    this.#device = deviceWay(context, this.#graph);
    this.#readMeter = createMeter(this.#graph.analyser);
    this.#readSpectrum = createSpectrum(this.#graph.analyser);
    this.#preparer = new Preparer(context.sampleRate);
    context.addEventListener('statechange', () => this.#onContextState());
    // The output could not be opened, or was lost.
    context.addEventListener('error', () => this.#fallSilent(hasStopped));
    if (whyNoWorklet(context) === null) void this.#openNode().catch(() => undefined);
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

  /**
   * Starts a sound from silence, quietly; a sound that plays already makes way for it.
   *
   * @param hearing name of the voice that is heard
   * @param score begins with the sound
   */
  async play(sound: Sound, hearing: string, score: Score | null = null): Promise<void> {
    const request = (this.#request += 1);
    const trouble = whyNoWorklet(this.#context) ?? whyUnplayable(sound, this.#context.sampleRate);
    if (trouble !== null) return this.#fallSilent(trouble);
    this.#sound = sound;
    this.#hearing = hearing;
    this.#score = score;
    clearTimeout(this.#sleepTimer);
    this.#stopChanging();
    this.#become({ status: 'starting', trouble: null });
    // Where no device answers, some browsers leave this promise open for ever.
    void this.#context.resume().catch(() => undefined);
    const before = this.#context.currentTime;
    const opened = await this.#open(sound, request);
    if (request !== this.#request) return;
    if (opened !== null) return this.#fallSilent(opened);
    const isAwake = await this.#wake(before);
    if (request !== this.#request) return;
    if (!isAwake) return this.#fallSilent(notStarted);
    this.#become({ status: 'playing', trouble: null });
    const isUnheard = await lacksOutputDevice(this.#context);
    if (isUnheard && request === this.#request && this.#state.status === 'playing') {
      this.#become({ status: 'playing', trouble: noDevice });
    }
  }

  /** Lets the audio device go until something is to sound; once the player is in its place. */
  async rest(): Promise<void> {
    await this.#node?.catch(() => undefined);
    if (this.#state.status === 'silent') void this.#context.suspend().catch(() => undefined);
  }

  /** Fades out and lets the audio device go. */
  stop(): void {
    this.#request += 1;
    if (this.#state.status !== 'silent') this.#fallSilent(null);
  }

  /** Takes up a changed wave, drive or set of voices while the sound plays; the wave's phase goes on. */
  change(sound: Sound): void {
    if (this.#state.status === 'silent' || this.#sound === null || sound === this.#sound) return;
    const [isPass, wasPass] = [sound.drive.kind === 'once', this.#sound.drive.kind === 'once'];
    if (isPass !== wasPass) return this.stop();
    this.#sound = sound;
    if (!isPass) this.#takeUp();
  }

  /** Goes over to another voice, in phase. */
  hear(voice: string): void {
    if (voice === this.#hearing) return;
    this.#hearing = voice;
    this.#player?.tell({ kind: 'hear', hearing: voice });
  }

  /** Notes, glides and pulses from now on; `null` gives the sound back to its drive, gate open. */
  perform(score: Score | null): void {
    if (score === this.#score) return;
    this.#score = score;
    const sound = this.#sounding;
    if (this.#player === null || sound === null || this.#state.status === 'silent') return;
    const request = this.#request;
    const grids = this.#preparer.gridsFor(sound, score);
    const tell = (made: Awaited<typeof grids>) => {
      if (request !== this.#request || sound !== this.#sounding || score !== this.#score) return;
      if (made !== null) return this.#player?.tell({ kind: 'perform', score, grids: made });
      void this.#goOver(sound).then(() => this.#player?.tell({ kind: 'perform', score, grids: {} }));
    };
    if (grids instanceof Promise) grids.then(tell, () => this.#fallSilent(hasFailed));
    else tell(grids);
  }

  /** @param volumeDb in `volumeRangeDb` */
  setVolume(volumeDb: number): void {
    glide(this.#graph.volume.gain, outputGain(volumeDb), this.#context.currentTime, glideSeconds.volume);
  }

  /**
   * Puts the response of where it will be heard into the way, over a crossfade.
   *
   * @param impulse FIR at `contextRateHz`; `null` for the straight way
   */
  setDevice(impulse: Float32Array | null): void {
    this.#device.put(impulse);
  }

  /** What sounds now; `null` while nothing does. */
  meter(): MeterReading | null {
    return this.#state.status === 'playing' ? this.#readMeter() : null;
  }

  /**
   * Fills the bins of a live spectrum in dBFS: the peak bin of a sine reads its amplitude, up to 1.1 dB less where it
   * lies between two.
   *
   * @param levelsDb `spectrumBins` numbers; −Infinity is silence
   * @returns width of a bin in hertz; `null` while nothing sounds
   */
  spectrum(levelsDb: Float32Array): number | null {
    return this.#state.status === 'playing' ? this.#readSpectrum(levelsDb) : null;
  }

  /** Stops and gives the context back. The preview cannot be used afterwards. */
  close(): void {
    this.stop();
    clearTimeout(this.#sleepTimer);
    this.#preparer.close();
    setTimeout(() => void this.#context.close(), 1000 * 10 * glideSeconds.fadeOut);
  }

  #become(state: PreviewState): void {
    this.#state = state;
    for (const listener of this.#listeners) listener();
  }

  #openNode(): Promise<PlayerNode> {
    this.#node ??= PlayerNode.open(this.#context, this.#graph.input, {
      onEnded: (request) => request === this.#request && this.#fallSilent(null),
      onBroken: () => {
        this.#node = this.#player = null;
        this.#fallSilent(hasFailed);
      },
    }).then(
      (player) => (this.#player = player),
      (error: unknown) => {
        this.#node = null;
        throw error;
      },
    );
    return this.#node;
  }

  /** Hands the sound over before anybody knows whether the context runs, so that its first quantum sounds. */
  async #open(sound: Sound, request: number): Promise<string | null> {
    const node = this.#openNode();
    node.catch(() => undefined);
    let score = this.#score;
    let program, player;
    try {
      program = await this.#preparer.prepare(sound, score);
      player = await node;
      while (score !== this.#score) program = await this.#preparer.prepare(sound, (score = this.#score));
    } catch {
      return program === undefined ? hasFailed : notFetched;
    }
    if (request !== this.#request) return null;
    this.#sounding = sound;
    player.tell({ kind: 'start', program, hearing: this.#hearing, score: this.#score, request });
    glideFromSilence(this.#graph.fade.gain, this.#context.currentTime, glideSeconds.fadeIn);
    this.#takeUp();
    return null;
  }

  async #wake(before: number): Promise<boolean> {
    const context = this.#context;
    const deadline = performance.now() + patienceMs;
    while (performance.now() < deadline) {
      if (context.state === 'running' && context.currentTime > before) return true;
      await new Promise((resolve) => setTimeout(resolve, 5));
    }
    return false;
  }

  /** Goes over to the newest sound, at once or as soon as the last change is over. */
  #takeUp(): void {
    if (this.#isChanging || this.#changeTimer !== undefined || this.#sounding === null) return;
    if (this.#sound === null || this.#sound === this.#sounding) return;
    const wait = this.#mayChangeAt - performance.now();
    if (wait <= 0) return void this.#goOver(this.#sound);
    this.#changeTimer = setTimeout(() => {
      this.#changeTimer = undefined;
      this.#takeUp();
    }, wait);
  }

  async #goOver(sound: Sound): Promise<void> {
    const trouble = whyUnplayable(sound, this.#context.sampleRate);
    if (trouble !== null) return this.#fallSilent(trouble);
    const request = this.#request;
    const score = this.#score;
    this.#isChanging = true;
    const begun = performance.now();
    const prepared = this.#preparer.prepare(sound, score);
    let program;
    try {
      // Made within this task it is told within this task.
      program = prepared instanceof Promise ? await prepared : prepared;
    } catch {
      return this.#fallSilent(hasFailed);
    }
    if (request !== this.#request) return;
    // Its grids are those of a score that is over by now.
    if (score !== this.#score) return this.#goOver(sound);
    this.#isChanging = false;
    this.#sounding = sound;
    this.#player?.tell({ kind: 'change', program });
    const end = performance.now();
    this.#mayChangeAt = end + Math.max(changeEveryMs, restPerWork * (end - begun));
    this.#takeUp();
  }

  #stopChanging(): void {
    clearTimeout(this.#changeTimer);
    this.#changeTimer = undefined;
    this.#isChanging = false;
    this.#sounding = null;
  }

  #fallSilent(trouble: string | null): void {
    // What is still being made ready must not sound.
    this.#request += 1;
    const now = this.#context.currentTime;
    const silentAt = glideToSilence(this.#graph.fade.gain, now, glideSeconds.fadeOut);
    this.#stopChanging();
    clearTimeout(this.#sleepTimer);
    this.#sleepTimer = setTimeout(
      () => {
        this.#player?.tell({ kind: 'stop' });
        void this.#context.suspend();
      },
      1000 * (silentAt - now) + 100,
    );
    this.#become(trouble === null ? silent : { status: 'silent', trouble });
  }

  #onContextState(): void {
    if (this.#context.state === 'running' || this.#state.status !== 'playing') return;
    this.#fallSilent(hasStopped);
  }
}
