import { pinDelayFrames } from '../../../shared/listening/kernel-shape.ts';
import { PinPlayer } from '../../../shared/listening/pin-player.ts';
import type { Drive } from '../../../shared/listening/sound.ts';
import type { Pitch, VoiceProgram } from '../player-messages.ts';
import { loopHzOf, stepWordOf, type Performed } from './performed.ts';

/** Frames that are played unheard before a voice that goes on from somewhere: longer than an edge takes to rise. */
const preRollFrames = 128;
const unheard = new Float32Array(preRollFrames);

/**
 * Plays a table entry by entry. It comes `pinDelayFrames` late, so that it has to be told of everything as much earlier.
 * Unheard it only keeps count of where it would be; woken, it plays a short way up to there first.
 */
export class PinVoice {
  readonly #rateHz: number;
  readonly #player: PinPlayer;
  readonly #pitch: Pitch;
  readonly #drive: Drive;
  readonly #tableLength: number;
  #loopHz: number;
  /** Where the pin would be while it is asleep, in rounds. */
  #phase = 0;
  #isAsleep = false;

  /** @param phase of what is heard of its first frame, in rounds; `null` where it begins with its first entry */
  constructor(
    { pitch, pin }: VoiceProgram & { kind: 'pin' },
    rateHz: number,
    performed: Performed,
    phase: number | null,
  ) {
    this.#rateHz = rateHz;
    this.#pitch = pitch;
    this.#drive = pin.drive;
    this.#tableLength = pin.values.length;
    this.#player = new PinPlayer(rateHz);
    this.#player.load(pin);
    this.#loopHz = loopHzOf(pitch, performed);
    this.#setPitch(performed);
    if (phase === null) return;
    this.#phase = phase + this.#delay;
    this.#isAsleep = true;
  }

  /** By how much the pin is ahead of what is heard, in rounds. */
  get #delay(): number {
    return (pinDelayFrames * this.#loopHz) / this.#rateHz;
  }

  /** What is heard now, in rounds. */
  get heardPhase(): number {
    const phase = (this.#isAsleep ? this.#phase : this.#player.phase) - this.#delay;
    return phase - Math.floor(phase);
  }

  perform(performed: Performed): void {
    const loopHz = loopHzOf(this.#pitch, performed);
    if (loopHz === this.#loopHz) return;
    this.#loopHz = loopHz;
    this.#setPitch(performed);
  }

  /**
   * Has to come before it is heard.
   *
   * @param beside another voice that is awake: driven alike, its place is taken exactly, of an accumulator to the bit
   */
  wake(beside: PinVoice | null): void {
    if (!this.#isAsleep) return;
    this.#isAsleep = false;
    const begun = this.#phase - (preRollFrames * this.#loopHz) / this.#rateHz;
    this.#player.seek(begun - Math.floor(begun));
    this.#player.process(unheard, 0, preRollFrames);
    if (beside !== null && this.#isDrivenLike(beside)) this.#player.follow(beside.#player);
  }

  /** Fills `out[from … to − 1]`. */
  render(out: Float32Array, from: number, to: number): void {
    this.#player.process(out, from, to);
  }

  /** Goes on unheard. */
  skip(frames: number): void {
    // A pass has nowhere to be found again.
    if (this.#drive.kind === 'once') return this.#player.skip(frames);
    if (!this.#isAsleep) {
      this.#phase = this.#player.phase;
      this.#isAsleep = true;
    }
    const phase = this.#phase + (frames * this.#loopHz) / this.#rateHz;
    this.#phase = phase - Math.floor(phase);
  }

  #setPitch(performed: Performed): void {
    const pitch = this.#pitch;
    if (pitch.by === 'stepWord') this.#player.setStepWord(stepWordOf(pitch, performed.stepWord));
    else this.#player.setSampleRate(this.#loopHz * this.#tableLength);
  }

  #isDrivenLike(other: PinVoice): boolean {
    const [own, its] = [this.#drive, other.#drive];
    if (own.kind !== its.kind || own.sampleRateHz !== its.sampleRateHz || this.#loopHz !== other.#loopHz)
      return false;
    if (own.kind !== 'accumulator' || its.kind !== 'accumulator')
      return this.#tableLength === other.#tableLength;
    return own.accumulatorBits === its.accumulatorBits;
  }
}
