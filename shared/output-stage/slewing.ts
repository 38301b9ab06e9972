/** A buffer whose rate `ω·(p − y)` is limited to ±slew, behind a node p that nears a level V with time constant τ. */
export interface Follower {
  /** 2π times the gain-bandwidth product, in 1/s. */
  readonly rate: number;
  /** In V/s. */
  readonly slew: number;
}

/** −1 and 1 while the buffer slews down or up, 0 while it follows. */
export type Mode = -1 | 0 | 1;

/** What the two do from some moment on. */
export interface FollowerState {
  /** Level that the node nears, its present voltage and the buffer's, in V. */
  readonly level: number;
  readonly node: number;
  readonly buffer: number;
  /** Time constant of the node, in s; 0 where it is at its level. */
  readonly tau: number;
}

/** Beyond the limit by less than this share is at the limit: there both modes do the same. */
const nearly = 1 + 1e-12;

/** The buffer's mode at the beginning of a hold. */
export function modeOf({ node, buffer }: FollowerState, { rate, slew }: Follower): Mode {
  const wanted = rate * (node - buffer);
  if (wanted > slew * nearly) return 1;
  return wanted < -slew * nearly ? -1 : 0;
}

/** The node after a time t. */
export function nodeAfter({ level, node, tau }: FollowerState, t: number): number {
  return tau === 0 ? node : level + (node - level) * Math.exp(-t / tau);
}

/** The buffer after a time t in one mode. */
export function bufferAfter(state: FollowerState, mode: Mode, follower: Follower, t: number): number {
  if (mode !== 0) return state.buffer + mode * follower.slew * t;
  return nodeAfter(state, t) - distanceAfter(state, follower.rate, t);
}

/**
 * Distance `d = p − y` while the buffer follows: `d' = −ωd + B·e^(−t/τ)`, B the node's first rate, so that
 * `d = d₀·e^(−ωt) + B·(e^(−t/τ) − e^(−ωt))/(ω − 1/τ)`, which has a limit where the rates are equal.
 */
function distanceAfter({ level, node, buffer, tau }: FollowerState, rate: number, t: number): number {
  const own = (node - buffer) * Math.exp(-rate * t);
  if (tau === 0) return own;
  const apart = rate - 1 / tau;
  const x = apart * t;
  const driven =
    Math.abs(x) > 1
      ? (Math.exp(-t / tau) - Math.exp(-rate * t)) / apart
      : Math.exp(-rate * t) * t * (x === 0 ? 1 : Math.expm1(x) / x);
  return own + ((level - node) / tau) * driven;
}

/** How long the buffer stays in its mode, in s; infinite where that is `within` or longer. */
export function timeInMode(state: FollowerState, mode: Mode, follower: Follower, within: number): number {
  return mode === 0 ? timeFollowing(state, follower, within) : timeSlewing(state, mode, follower, within);
}

/** The distance has one hump at most; the buffer begins to slew where that passes the limit. */
function timeFollowing(state: FollowerState, { rate, slew }: Follower, within: number): number {
  const { level, node, buffer, tau } = state;
  if (tau === 0 || level === node) return Infinity;
  const apart = rate - 1 / tau;
  const first = (level - node) / tau;
  // From d' = 0: e^((ω − 1/τ)·t) = ωτ·(1 − d₀·(ω − 1/τ)/B).
  const start = (node - buffer) / first;
  const hump = apart === 0 ? tau - start : (Math.log1p(-start * apart) + Math.log1p(apart * tau)) / apart;
  if (!(hump > 0)) return Infinity;
  const end = Math.min(within, hump);
  const beyond = (t: number) => Math.abs(distanceAfter(state, rate, t)) - slew / rate;
  if (beyond(end) <= (nearly - 1) * (slew / rate)) return Infinity;
  return rootBetween(beyond, 0, end);
}

/** While it slews, y is a straight line and p an exponential; it follows again once they are near enough. */
function timeSlewing(state: FollowerState, mode: Mode, { rate, slew }: Follower, within: number): number {
  const { level, node, buffer, tau } = state;
  const enough = slew / rate;
  if (tau === 0) {
    const time = (Math.abs(node - buffer) - enough) / slew;
    return time < within ? time : Infinity;
  }
  const missing = (t: number) => enough + slew * t + mode * (buffer - nodeAfter(state, t));
  // The distance can grow at first, where the node runs away faster than the buffer follows. It is concave then,
  // and falls for good from where its slope is 0.
  const runsAway = (mode * (level - node)) / (slew * tau);
  const top = runsAway > 1 ? tau * Math.log(runsAway) : 0;
  return top < within && missing(within) > 0 ? rootBetween(missing, top, within) : Infinity;
}

/** Root of a function that is at most 0 at `low` and at least 0 at `high`, by halves, to the last bits. */
function rootBetween(off: (t: number) => number, low: number, high: number): number {
  let [from, to] = [low, high];
  for (let turn = 0; turn < 80 && to - from > 1e-15 * to; turn += 1) {
    const middle = (from + to) / 2;
    if (off(middle) < 0) from = middle;
    else to = middle;
  }
  return to;
}
