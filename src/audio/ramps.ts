/** Time constants in seconds; a change has gone 95 % of its way after three of them. */
export const glideSeconds = { fadeIn: 0.03, fadeOut: 0.025, volume: 0.02, crossfade: 0.012 } as const;

/** Time constants after which a glide to silence is at −87 dB and its sources can end unheard. */
const constantsToSilence = 10;

/**
 * Moves a gain towards `target` from wherever it is at time `at` (seconds of the context's clock). An exponential
 * approach needs no cancelling of what was scheduled, so it can be turned round half-way without a step, and two
 * gains that glide together keep a constant sum.
 */
export function glide(param: AudioParam, target: number, at: number, timeConstant: number): void {
  param.setTargetAtTime(target, at, timeConstant);
}

/** Comes up to 1, whatever silence was scheduled for later. */
export function glideFromSilence(param: AudioParam, at: number, timeConstant: number): void {
  param.cancelScheduledValues(at);
  glide(param, 1, at, timeConstant);
}

/** Glides to 0 and stays there. @returns the time from which on there is silence, in seconds */
export function glideToSilence(param: AudioParam, at: number, timeConstant: number): number {
  const silentAt = at + constantsToSilence * timeConstant;
  glide(param, 0, at, timeConstant);
  param.setValueAtTime(0, silentAt);
  return silentAt;
}
