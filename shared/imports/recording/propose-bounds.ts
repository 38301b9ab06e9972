import type { CycleBounds } from './cut-cycle.ts';

/**
 * Where in a recording of that period one cycle is best cut out: where it is loud and most like the cycle after it,
 * from one rising zero crossing to the next one a period later.
 */
export function proposeBounds(samples: Float64Array, periodSamples: number): CycleBounds {
  const start = steadiest(samples, periodSamples);
  return snapBounds(samples, { startSample: start, endSample: start + periodSamples });
}

/** The place, in steps of half a period, where two cycles differ least for how loud they are. */
function steadiest(samples: Float64Array, period: number): number {
  const length = Math.round(period);
  const hop = Math.max(1, Math.floor(length / 2));
  const places: { at: number; energy: number; difference: number }[] = [];
  // A period is kept free on both sides, for the search for a crossing and for joining the ends.
  for (let at = length; at + 4 * length < samples.length; at += hop) {
    let energy = 0;
    let difference = 0;
    for (let i = at; i < at + length; i += 1) {
      energy += samples[i] * samples[i];
      difference += (samples[i] - samples[i + length]) ** 2;
    }
    places.push({ at, energy, difference });
  }
  const loudest = places.reduce((most, { energy }) => Math.max(most, energy), 0);
  let best: (typeof places)[number] | undefined;
  for (const place of places) {
    if (place.energy < loudest / 4 || place.energy === 0) continue;
    if (!best || place.difference / place.energy < best.difference / best.energy) best = place;
  }
  return best?.at ?? Math.max(0, Math.floor((samples.length - 1 - period) / 2));
}

/**
 * Moves bounds onto rising zero crossings: the start to the crossing within half a cycle of it after which the signal
 * is most like what follows the end; the end to the crossing nearest to one cycle later, if there is one within a
 * fiftieth of a cycle or a sample. Crossings are counted from the mean of the cycle.
 */
export function snapBounds(samples: Float64Array, { startSample, endSample }: CycleBounds): CycleBounds {
  const period = endSample - startSample;
  const mean = meanOf(samples, Math.floor(startSample), Math.ceil(endSample));
  const crossings = risingCrossings(samples, startSample - period / 2, startSample + period / 2, mean);
  const lastStart = samples.length - 1 - period;
  let start = startSample;
  let least = Infinity;
  for (const at of crossings) {
    if (at < 0 || at > lastStart) continue;
    const unlike = unlikeness(samples, at, period);
    if (unlike < least) [start, least] = [at, unlike];
  }
  const near = Math.max(1, period / 50);
  const wanted = start + period;
  let end = wanted;
  let nearest = Infinity;
  for (const at of risingCrossings(samples, wanted - near, wanted + near, mean)) {
    const distance = Math.abs(at - wanted);
    if (distance < nearest && at <= samples.length - 1) [end, nearest] = [at, distance];
  }
  return { startSample: start, endSample: Math.min(end, samples.length - 1) };
}

function meanOf(samples: Float64Array, from: number, to: number): number {
  let sum = 0;
  let count = 0;
  for (let i = Math.max(0, from); i < Math.min(samples.length, to); i += 1, count += 1) sum += samples[i];
  return count === 0 ? 0 : sum / count;
}

function risingCrossings(samples: Float64Array, from: number, to: number, level: number): number[] {
  const found: number[] = [];
  const last = Math.min(samples.length - 1, Math.ceil(to));
  for (let i = Math.max(1, Math.floor(from)); i <= last; i += 1) {
    const [before, after] = [samples[i - 1] - level, samples[i] - level];
    if (before < 0 && after >= 0) {
      const at = i - 1 + before / (before - after);
      if (at >= from && at <= to) found.push(at);
    }
  }
  return found;
}

/** Mean square of the difference around a place and one period later, an eighth of a period each way. */
function unlikeness(samples: Float64Array, at: number, period: number): number {
  const width = Math.max(1, Math.round(period / 8));
  let sum = 0;
  let count = 0;
  for (let i = Math.round(at) - width; i <= Math.round(at) + width; i += 1) {
    const later = Math.round(i + period);
    if (i < 0 || later >= samples.length) continue;
    sum += (samples[i] - samples[later]) ** 2;
    count += 1;
  }
  return count === 0 ? Infinity : sum / count;
}
