import { pinDelayFrames } from '../../../shared/listening/kernel-shape.ts';
import type { PitchGrid, SoundProgram, VoicePart } from '../player-messages.ts';
import { PassVoice } from './pass-voice.ts';
import type { Performed } from './performed.ts';
import { PinVoice } from './pin-voice.ts';
import { Ramp } from './ramp.ts';
import { RoundVoice } from './round-voice.ts';

/** Fade at both ends of a pass: 50 ms, or a tenth of a pass that is shorter than half a second. */
const passFadeSeconds = (seconds: number) => Math.min(0.05, seconds / 10);

interface Part {
  readonly name: string;
  readonly cycles: number;
  readonly voice: RoundVoice | PinVoice | PassVoice;
  readonly ramp: Ramp;
  /** Silence before it begins, in frames, so that first entries of all voices come at one time. */
  waitFrames: number;
}

/** Where a layer goes on: with nothing, or where another is. */
export interface Beginning {
  readonly after: Layer | null;
  readonly hearing: string;
  /** What applies to voices that are heard at once, and to those that come late. */
  readonly now: Performed;
  readonly ahead: Performed;
}

/** The voices of one sound in step, each behind its own gain, and one gain about them all. */
export class Layer {
  readonly ramp: Ramp;
  readonly #parts: Part[];
  readonly #rateHz: number;
  /** Frames of a pass and of the fades at its ends; 0 where it goes round. */
  readonly #passFrames: number = 0;
  readonly #fadeFrames: number = 0;
  #played = 0;

  /** @param curve of `rampCurve`, for all crossfades of voices and layers */
  constructor(program: SoundProgram, rateHz: number, curve: Float64Array, beginning: Beginning) {
    this.#rateHz = rateHz;
    this.ramp = new Ramp(curve, 1);
    const lead = Math.max(...Object.values(program.voices).map(leadOf));
    this.#parts = Object.entries(program.voices).map(([name, part]) => ({
      name,
      cycles: part.cycles,
      voice: this.#voiceOf(name, part, beginning),
      ramp: new Ramp(curve, 0),
      waitFrames: program.passSeconds === undefined ? 0 : lead - leadOf(part),
    }));
    const heard = this.#partOf(beginning.hearing) ?? this.#parts.at(0);
    heard?.ramp.jump(1);
    if (heard?.voice instanceof PinVoice) heard.voice.wake(beginning.after?.pinAwake() ?? null);
    if (program.passSeconds === undefined) return;
    this.#passFrames = Math.ceil(program.passSeconds * rateHz) + 2 * lead;
    this.#fadeFrames = Math.round(passFadeSeconds(this.#passFrames / rateHz) * rateHz);
  }

  /** Goes over to a voice; to one that is not there it does not. */
  hear(name: string): void {
    const next = this.#partOf(name);
    if (next === undefined) return;
    if (next.voice instanceof PinVoice) next.voice.wake(this.pinAwake());
    for (const part of this.#parts) part.ramp.go(part.name === name ? 1 : 0);
  }

  /** A pitch for the voices that are heard at once. */
  performNow(performed: Performed): void {
    for (const { voice } of this.#parts) if (voice instanceof RoundVoice) voice.perform(performed);
  }

  /** A pitch for the voices that come late. */
  performAhead(performed: Performed): void {
    for (const { voice } of this.#parts) if (voice instanceof PinVoice) voice.perform(performed);
  }

  addGrids(grids: Readonly<Record<string, readonly PitchGrid[]>>): void {
    for (const { name, voice } of this.#parts) {
      if (voice instanceof RoundVoice && name in grids) voice.addGrids(grids[name]);
    }
  }

  /** Whether it can be forgotten: it has given way, or its pass is over. */
  get isOver(): boolean {
    return this.ramp.isSilent || this.hasEnded;
  }

  get hasEnded(): boolean {
    return this.#passFrames > 0 && this.#played >= this.#passFrames;
  }

  /** Adds `out[from … to − 1]`; `scratch` and `gains` are as long and lose what they hold. */
  render(out: Float32Array, from: number, to: number, scratch: Float32Array, gains: Float64Array): void {
    for (const part of this.#parts) {
      const { voice, ramp } = part;
      const begin = Math.min(to, from + part.waitFrames);
      part.waitFrames -= begin - from;
      if (ramp.isSilent) {
        voice.skip(to - begin);
        continue;
      }
      scratch.fill(0, from, begin);
      voice.render(scratch, begin, to);
      gains.fill(1, from, to);
      ramp.scale(gains, from, to);
      ramp.skip(to - from);
      this.ramp.scale(gains, from, to);
      if (this.#passFrames > 0) this.#fadePass(gains, from, to);
      for (let i = from; i < to; i += 1) out[i] += scratch[i] * gains[i];
    }
    this.ramp.skip(to - from);
    this.#played += to - from;
  }

  #fadePass(gains: Float64Array, from: number, to: number): void {
    for (let i = from; i < to; i += 1) {
      const frame = this.#played + i - from;
      const toEnd = Math.min(frame, this.#passFrames - 1 - frame) + 0.5;
      if (toEnd < 0) gains[i] = 0;
      else if (toEnd < this.#fadeFrames)
        gains[i] *= 0.5 - 0.5 * Math.cos((Math.PI * toEnd) / this.#fadeFrames);
    }
  }

  /** A pin that is heard, whose place another can take exactly. */
  pinAwake(): PinVoice | null {
    for (const { voice, ramp } of this.#parts) if (voice instanceof PinVoice && !ramp.isSilent) return voice;
    return null;
  }

  #partOf(name: string): Part | undefined {
    return this.#parts.find((part) => part.name === name);
  }

  #voiceOf(name: string, part: VoicePart, { after, now, ahead }: Beginning): Part['voice'] {
    if (part.kind === 'pass') return new PassVoice(part.pass);
    const going = after?.cyclesHeard(name) ?? null;
    if (part.kind === 'pin') {
      return new PinVoice(part, this.#rateHz, ahead, going === null ? null : going / part.cycles);
    }
    const voice = new RoundVoice(part, this.#rateHz, now, going === null ? 0 : going / part.cycles);
    // In step with a pin that begins with its first entry now.
    if (going === null) voice.skip(-pinDelayFrames);
    return voice;
  }

  /** How many cycles of its round a voice has gone through, or the first one where there is none of that name. */
  cyclesHeard(name: string): number | null {
    const part = this.#partOf(name) ?? this.#parts.at(0);
    if (part === undefined || part.voice instanceof PassVoice) return null;
    return part.voice.heardPhase * part.cycles;
  }
}

/** Frames from the beginning of a voice to its first entry. */
const leadOf = (part: VoicePart) => (part.kind === 'pass' ? part.pass.firstEntryFrame : pinDelayFrames);
