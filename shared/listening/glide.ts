import { Refusal, showValue } from '../contract/index.ts';
import { centsBetween } from '../playback/index.ts';
import type { ScoreEvent } from './sound.ts';
import { planTone, registerOf, settingOf, type ToneDrive, type ToneSetting } from './tone-drive.ts';

export interface GlideSettings {
  readonly fromHz: number;
  readonly toHz: number;
  /** 0…10. */
  readonly seconds: number;
  /** Time between two updates of the register, 0.0001…1. */
  readonly updateSeconds: number;
  /** `exponential`: as many cents every second; `linear`: as many hertz. */
  readonly path: 'exponential' | 'linear';
}

/** One write to the register that changes it. */
export type GlideStep = ToneSetting & {
  readonly atSeconds: number;
  readonly hz: number;
  /** Step word or compare value; `null` where any rate can be had. */
  readonly word: number | null;
};

export interface Glide {
  /** The first at 0 s; no two in a row are the same. */
  readonly steps: readonly GlideStep[];
  /** Hertz from each update to the next, the last on arrival. */
  readonly heldHz: Float64Array;
  /** Hertz of the path at each update. */
  readonly pathHz: Float64Array;
  /** Largest step, without its sign; 0 where there is none. */
  readonly largestStepCents: number;
  /** How far the last step lies above what was wanted. */
  readonly endErrorCents: number;
}

/** More updates than these are asked to be fewer. */
const updatesAtMost = 10_000;

/**
 * A glide as firmware makes it: at update k, at k times the update time, the register takes the whole number nearest to
 * the path there, and holds it until the next. The update that first comes at or after the glide's time takes the end.
 * A free rate takes the path as it is.
 *
 * @throws {Refusal} where either end is beyond the drive's reach, or a time out of range.
 */
export function planGlide(drive: ToneDrive, settings: GlideSettings): Glide {
  const { fromHz, toHz, seconds, updateSeconds } = settings;
  const updates = updatesOf(settings);
  planTone(drive, fromHz);
  const end = planTone(drive, toHz);
  const register = registerOf(drive);
  const steps: GlideStep[] = [];
  const heldHz = new Float64Array(updates + 1);
  const pathHz = new Float64Array(updates + 1);
  let last: number | null = null;
  let largestStepCents = 0;
  for (let k = 0; k <= updates; k += 1) {
    const wantedHz = k === updates ? toHz : along(settings, (k * updateSeconds) / seconds);
    const word = register.wordFor(wantedHz);
    const hz = register.hzOf(word);
    pathHz[k] = wantedHz;
    heldHz[k] = hz;
    if (word === last) continue;
    last = word;
    if (k > 0) largestStepCents = Math.max(largestStepCents, Math.abs(centsBetween(hz, heldHz[k - 1])));
    steps.push({
      atSeconds: k * updateSeconds,
      hz,
      word: drive.kind === 'rate' ? null : word,
      ...settingOf(drive, word, hz),
    });
  }
  return { steps, heldHz, pathHz, largestStepCents, endErrorCents: end.errorCents };
}

/** The steps alone, for a score. */
export function glideSteps(drive: ToneDrive, settings: GlideSettings): readonly GlideStep[] {
  return planGlide(drive, settings).steps;
}

/** A glide as events of a score that begins to glide after a wait, gate open. */
export function glideEvents(steps: readonly GlideStep[], waitSeconds = 0): ScoreEvent[] {
  const [first] = steps;
  const events = steps.map(({ hz: _hz, word: _word, ...step }) => ({
    ...step,
    atSeconds: step.atSeconds + waitSeconds,
  }));
  if (first === undefined) return events;
  const start = { ...events[0], atSeconds: 0, gate: true };
  return waitSeconds > 0 ? [start, ...events] : [start, ...events.slice(1)];
}

/** What a glide sounds, so many seconds after it began, in Hz. */
export function glideHzAt(steps: readonly GlideStep[], seconds: number): number {
  let low = 0;
  let high = steps.length - 1;
  while (low < high) {
    const middle = Math.ceil((low + high) / 2);
    if (steps[middle].atSeconds <= seconds) low = middle;
    else high = middle - 1;
  }
  return steps[low].hz;
}

function along({ fromHz, toHz, path }: GlideSettings, share: number): number {
  return path === 'linear'
    ? fromHz + share * (toHz - fromHz)
    : fromHz * Math.exp(share * Math.log(toHz / fromHz));
}

function updatesOf({ seconds, updateSeconds }: GlideSettings): number {
  mustLie('seconds', seconds, 0, 10);
  mustLie('updateSeconds', updateSeconds, 0.0001, 1);
  // A glide of a whole number of updates must not become one longer by the quotient's last bit.
  const updates = Math.max(0, Math.ceil(seconds / updateSeconds - 1e-9));
  if (updates <= updatesAtMost) return updates;
  throw new Refusal({
    path: 'updateSeconds',
    value: `${updates} updates`,
    allowed: `up to ${updatesAtMost}: a shorter glide, or more time between updates`,
  });
}

function mustLie(path: string, value: number, min: number, max: number): void {
  if (value >= min && value <= max) return;
  throw new Refusal({ path, value: showValue(value), allowed: `${min} to ${max} s` });
}
