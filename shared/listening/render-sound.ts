import { convolve } from './convolve.ts';
import { roundHzOf } from './drive.ts';
import type { Drive, Score, ScoreEvent, Voice } from './sound.ts';
import { sourceOf } from './voice-source.ts';

/** What is rendered, frame by frame at a rate of its own. */
export interface RenderOrder {
  readonly voice: Voice;
  /** The sound's; the voice's own goes before it. */
  readonly drive: Drive;
  /** Frames a second, above 0. */
  readonly rateHz: number;
  /** How many, from 1. */
  readonly frames: number;
  /** Begins with the first frame. */
  readonly score?: Score | null;
  /** Response of where it is heard, at `rateHz`. */
  readonly impulse?: Float32Array | null;
  /** Comes and goes within `fadeSeconds` at both ends; else it begins and ends in full, for a loop to go on. */
  readonly isFaded: boolean;
}

/** Of a fade, and of a gate that opens or closes: half a period of a raised cosine. */
export const fadeSeconds = 0.005;
/** Until what goes on without end is in its steady state behind a stage. */
const settledSeconds = 0.25;
/** Of one entry, so long at most: a slower table makes no sound. */
const entrySeconds = 10;
const stretchFrames = 16_384;

/**
 * Renders a voice as it is played, full scale ±1. A sound that only goes round is taken out of its middle: frame 0 is the
 * beginning of a round, and what went before rings on into it, so that whole rounds make a loop without a seam. A pass,
 * or a sound with a score, begins from silence, `delayFrames` of its source late.
 *
 * @param onProgress after each stretch, with the share that is done
 */
export function renderSound(
  { voice, drive, rateHz, frames, score, impulse, isFaded }: RenderOrder,
  onProgress: (share: number) => void = () => undefined,
): Float32Array<ArrayBuffer> {
  const own = voice.drive ?? drive;
  const isSteady = own.kind !== 'once' && (score ?? null) === null;
  const source = sourceOf(voice, drive, rateHz);
  const before = isSteady ? settledFrames(own, rateHz) + (impulse?.length ?? 0) : 0;
  if (isSteady) {
    // So that frame `before` shows the round's beginning.
    const rounds = ((before - source.delayFrames) * roundHzOf(own, voice.values.length)) / rateHz;
    const phase = Math.ceil(rounds) - rounds;
    source.seek(phase < 1 ? phase : 0);
  }
  const whole = new Float32Array(before + frames);
  const share = impulse ? 0.6 : 1;

  const events = eventsWithin(score ?? null, frames / rateHz, rateHz);
  let next = 0;
  for (let at = 0; at < whole.length;) {
    for (; next < events.length && frameOf(events[next], rateHz) <= at; next += 1)
      source.perform(events[next]);
    const until = next < events.length ? frameOf(events[next], rateHz) : Infinity;
    const end = Math.min(whole.length, at + stretchFrames, until);
    source.process(whole, at, end);
    at = end;
    onProgress((share * at) / whole.length);
  }
  applyGate(whole, events, source.delayFrames, rateHz);
  if (source.endFrame !== Infinity) endAt(whole, source.delayFrames + Math.round(source.endFrame), rateHz);

  const through = impulse
    ? convolve(whole, impulse, (done) => onProgress(share + (1 - share) * done))
    : whole;
  const heard = through.subarray(before);
  if (isFaded) fade(heard, rateHz, isSteady);
  return heard;
}

/** From the first entry on, which a pin may be a whole period away from. */
const settledFrames = ({ sampleRateHz }: Drive, rateHz: number) =>
  Math.ceil((settledSeconds + Math.min(entrySeconds, 1 / sampleRateHz)) * rateHz);

const frameOf = ({ atSeconds }: ScoreEvent, rateHz: number) => Math.round(atSeconds * rateHz);

/** Events of the first so many seconds, a score that repeats written out. */
function eventsWithin(score: Score | null, seconds: number, rateHz: number): readonly ScoreEvent[] {
  if (score === null) return [];
  const { events, repeatSeconds = 0 } = score;
  // What repeats within a frame would never end.
  if (!(repeatSeconds * rateHz >= 1)) return events.filter(({ atSeconds }) => atSeconds < seconds);
  const all: ScoreEvent[] = [];
  const ofRound = events.filter(({ atSeconds }) => atSeconds < repeatSeconds);
  if (ofRound.length === 0) return all;
  for (let round = 0; round * repeatSeconds < seconds; round += 1) {
    for (const event of ofRound) {
      const atSeconds = round * repeatSeconds + event.atSeconds;
      if (atSeconds < seconds) all.push({ ...event, atSeconds });
    }
  }
  return all;
}

/** Open until an event closes it. Each change takes `fadeSeconds`, and begins where the sound of its moment comes out. */
function applyGate(
  frames: Float32Array,
  events: readonly ScoreEvent[],
  delayFrames: number,
  rateHz: number,
): void {
  const changes = events.filter(({ gate }) => gate !== undefined);
  if (changes.length === 0) return;
  const step = 1 / Math.max(1, Math.round(fadeSeconds * rateHz));
  // A tone that the score opens with comes up as any other does.
  let isOpen = frameOf(changes[0], rateHz) > 0;
  let way = isOpen ? 1 : 0;
  let next = 0;
  for (let i = 0; i < frames.length; i += 1) {
    for (; next < changes.length && frameOf(changes[next], rateHz) + delayFrames <= i; next += 1)
      isOpen = changes[next].gate === true;
    way = isOpen ? Math.min(1, way + step) : Math.max(0, way - step);
    if (way < 1) frames[i] *= 0.5 - 0.5 * Math.cos(Math.PI * way);
  }
}

/** A pass goes out behind its last entry: the pin would stay where it is. */
function endAt(frames: Float32Array, frame: number, rateHz: number): void {
  const length = Math.max(1, Math.round(fadeSeconds * rateHz));
  for (let i = Math.max(0, frame); i < frames.length; i += 1) {
    const gone = (i - frame + 1) / length;
    frames[i] *= gone >= 1 ? 0 : 0.5 + 0.5 * Math.cos(Math.PI * gone);
  }
}

function fade(frames: Float32Array, rateHz: number, isFadedIn: boolean): void {
  const length = Math.min(Math.floor(frames.length / 2), Math.max(1, Math.round(fadeSeconds * rateHz)));
  for (let i = 0; i < length; i += 1) {
    const gain = 0.5 - 0.5 * Math.cos((Math.PI * i) / length);
    if (isFadedIn) frames[i] *= gain;
    frames[frames.length - 1 - i] *= gain;
  }
}
