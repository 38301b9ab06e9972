import { limits, type HarmonicsSource, type Partial } from '../../../../shared/contract/index.ts';

/** A place on the bar field: which harmonic's bar, and how far up (or, below 0, down). */
export interface BarPlace {
  readonly harmonic: number;
  readonly amplitude: number;
}

/** Highest harmonic that a table of N entries with K cycles holds, `2nK < N`; 0 where none fits. */
export function highestFitting(tableLength: number, cycles: number): number {
  return Math.max(0, Math.ceil(tableLength / (2 * cycles)) - 1);
}

/** What a bar stands for: the first partial of its harmonic, and how many there are. */
export interface Bar {
  readonly index: number;
  readonly count: number;
}

/** The bars that have a partial, by harmonic. */
export function barsOf(partials: readonly Partial[]): Map<number, Bar> {
  const bars = new Map<number, Bar>();
  partials.forEach(({ harmonic }, index) => {
    const bar = bars.get(harmonic);
    bars.set(harmonic, bar === undefined ? { index, count: 1 } : { index: bar.index, count: bar.count + 1 });
  });
  return bars;
}

/**
 * Draws from one place to another: every bar on the way takes the height of the line between the two. A bar that had
 * no partial gets one, in phase 0, once it has a height; a bar drawn to 0 keeps its partial and with it its phase.
 * Past the most partials that a wave can hold nothing is added.
 */
export function drawBars(source: HarmonicsSource, from: BarPlace, to: BarPlace): HarmonicsSource {
  const partials = [...source.partials];
  const step = Math.sign(to.harmonic - from.harmonic);
  const distance = Math.abs(to.harmonic - from.harmonic);
  let hasChanged = false;
  const bars = barsOf(partials);
  // Put in at the end: until then the places found stay right.
  const added: Partial[] = [];
  for (let i = distance; i >= 0; i -= 1) {
    const harmonic = from.harmonic + i * step;
    const amplitude =
      i === distance ? to.amplitude : tidy(from.amplitude + ((to.amplitude - from.amplitude) * i) / distance);
    const index = bars.get(harmonic)?.index;
    if (index !== undefined) {
      if (Object.is(partials[index].amplitude, amplitude)) continue;
      partials[index] = { ...partials[index], amplitude };
      hasChanged = true;
    } else if (amplitude !== 0 && partials.length + added.length < limits.partials.max) {
      added.push({ harmonic, amplitude, phaseDeg: 0 });
      hasChanged = true;
    }
  }
  for (const partial of added) insertInOrder(partials, partial);
  return hasChanged ? { ...source, partials } : source;
}

/** Puts a partial before the first one of a higher harmonic. */
function insertInOrder(partials: Partial[], partial: Partial): void {
  const at = partials.findIndex(({ harmonic }) => harmonic > partial.harmonic);
  partials.splice(at < 0 ? partials.length : at, 0, partial);
}

/** Sets one bar's height exactly. */
export function setBar(source: HarmonicsSource, { harmonic, amplitude }: BarPlace): HarmonicsSource {
  return drawBars(source, { harmonic, amplitude }, { harmonic, amplitude });
}

/** Takes away every partial of a harmonic; the last partial of the wave stays and falls to 0, as a wave needs one. */
export function removeBar(source: HarmonicsSource, harmonic: number): HarmonicsSource {
  const partials = source.partials.filter((partial) => partial.harmonic !== harmonic);
  if (partials.length === source.partials.length) return source;
  return partials.length > 0 ? { ...source, partials } : setBar(source, { harmonic, amplitude: 0 });
}

/** A partial to go on with: the lowest harmonic that has none yet. */
export function addPartial(source: HarmonicsSource): HarmonicsSource {
  const taken = new Set(source.partials.map(({ harmonic }) => harmonic));
  let harmonic = 1;
  while (taken.has(harmonic)) harmonic += 1;
  return { ...source, partials: [...source.partials, { harmonic, amplitude: 0, phaseDeg: 0 }] };
}

export function removePartial(source: HarmonicsSource, index: number): HarmonicsSource {
  return { ...source, partials: source.partials.toSpliced(index, 1) };
}

export function setPartial(
  source: HarmonicsSource,
  index: number,
  part: { [Name in keyof Partial]?: number },
): HarmonicsSource {
  return { ...source, partials: source.partials.with(index, { ...source.partials[index], ...part }) };
}

/** Whether the harmonics never fall from one partial to the next. */
export function isInOrder(partials: readonly Partial[]): boolean {
  return partials.every(({ harmonic }, index) => index === 0 || harmonic >= partials[index - 1].harmonic);
}

export function putInOrder(source: HarmonicsSource): HarmonicsSource {
  return { ...source, partials: source.partials.toSorted((one, other) => one.harmonic - other.harmonic) };
}

/**
 * Adds partials of the same harmonic together into one each, as sines of one frequency add: by amplitude and phase.
 * The wave stays what it was, to rounding.
 */
export function mergeDoubles(source: HarmonicsSource): HarmonicsSource {
  const bars = barsOf(source.partials);
  const merged: Partial[] = [];
  source.partials.forEach((partial, index) => {
    const bar = bars.get(partial.harmonic);
    if (bar === undefined || bar.count === 1) merged.push(partial);
    else if (bar.index === index)
      merged.push(sumOf(source.partials.filter(({ harmonic }) => harmonic === partial.harmonic)));
  });
  return { ...source, partials: merged };
}

function sumOf(partials: readonly Partial[]): Partial {
  let re = 0;
  let im = 0;
  for (const { amplitude, phaseDeg } of partials) {
    re += amplitude * Math.cos((phaseDeg * Math.PI) / 180);
    im += amplitude * Math.sin((phaseDeg * Math.PI) / 180);
  }
  const phaseDeg = (Math.atan2(im, re) * 180) / Math.PI;
  return { harmonic: partials[0].harmonic, amplitude: Math.hypot(re, im), phaseDeg };
}

/** Drops the last bits of an interpolated height, which nobody drew. */
function tidy(amplitude: number): number {
  return Number(amplitude.toPrecision(6));
}
