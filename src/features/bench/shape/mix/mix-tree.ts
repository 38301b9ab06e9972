import { limits, type MixPart, type MixSource, type Source } from '../../../../../shared/contract/index.ts';
import { asMix } from '../as-mix.ts';

/** Where a part stands: its place in the mix, in the mix within that, and so on. None for the whole. */
export type Place = readonly number[];

export const pathOf = (place: Place): string =>
  `source${place.map((index) => `.parts[${index}].source`).join('')}`;

/** The source at a place; `undefined` where there is none. */
export function sourceAt(source: Source, place: Place): Source | undefined {
  return place.reduce<Source | undefined>(
    (here, index) => (here?.kind === 'mix' ? here.parts[index]?.source : undefined),
    source,
  );
}

/** The nearest place that there is: that itself, or where undo left nothing the last part beside or the one around it. */
export function nearestPlace(source: Source, place: Place): Place {
  const near: number[] = [];
  let here = source;
  for (const index of place) {
    if (here.kind !== 'mix' || here.parts.length === 0) break;
    const at = Math.min(index, here.parts.length - 1);
    near.push(at);
    here = here.parts[at].source;
  }
  return near;
}

/** Puts another source at a place. */
export function setSource(source: Source, place: Place, next: Source): Source {
  const [index, ...inner] = place;
  if (index === undefined) return next;
  return changeParts(source, [], (parts) =>
    parts.with(index, { ...parts[index], source: setSource(parts[index].source, inner, next) }),
  );
}

/** Changes the parts of the mix at a place; a source that is none stays as it is. */
function changeParts(source: Source, place: Place, change: (parts: MixPart[]) => MixPart[]): Source {
  const mix = sourceAt(source, place);
  if (mix?.kind !== 'mix') return source;
  const next: MixSource = { ...mix, parts: change(mix.parts) };
  return place.length === 0 ? next : setSource(source, place, next);
}

const split = (place: Place): [around: Place, index: number] => [place.slice(0, -1), place[place.length - 1]];

export function setGain(source: Source, place: Place, gain: number): Source {
  const [around, index] = split(place);
  return changeParts(source, around, (parts) => parts.with(index, { ...parts[index], gain }));
}

export function setOperation(source: Source, place: Place, operation: MixSource['operation']): Source {
  const mix = sourceAt(source, place);
  return mix?.kind === 'mix' ? setSource(source, place, { ...mix, operation }) : source;
}

/** A part to go on with: a sine that a sum hardly notices, or a factor that leaves a product as it is. */
export function addPart(source: Source, place: Place): Source {
  const isProduct = isMixOf(sourceAt(source, place), 'product');
  const part: MixPart = {
    gain: isProduct ? 1 : 0.5,
    source: isProduct
      ? { kind: 'points', interpolation: 'step', points: [{ x: 0, y: 1 }, { x: 0.5, y: 1 }], bandlimit: false }
      : { kind: 'harmonics', offset: 0, partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
  }; // prettier-ignore
  return changeParts(source, place, (parts) => [...parts, part]);
}

function isMixOf(source: Source | undefined, operation: MixSource['operation']): boolean {
  return source?.kind === 'mix' && source.operation === operation;
}

export function removePart(source: Source, place: Place): Source {
  const [around, index] = split(place);
  return changeParts(source, around, (parts) => parts.toSpliced(index, 1));
}

export function duplicatePart(source: Source, place: Place): Source {
  const [around, index] = split(place);
  return changeParts(source, around, (parts) => parts.toSpliced(index + 1, 0, parts[index]));
}

/** Moves a part among those beside it. */
export function movePart(source: Source, place: Place, by: -1 | 1): Source {
  const [around, index] = split(place);
  return changeParts(source, around, (parts) => {
    const to = index + by;
    return to < 0 || to >= parts.length ? parts : parts.toSpliced(index, 1).toSpliced(to, 0, parts[index]);
  });
}

/** Makes a mix of one part out of what stands at a place. */
export function wrap(source: Source, place: Place): Source {
  const inner = sourceAt(source, place);
  if (inner === undefined) return source;
  return setSource(source, place, asMix(inner));
}

/** All places of parts, in the order in which they stand on the page. */
export function placesIn(source: Source, around: Place = []): Place[] {
  if (source.kind !== 'mix') return [];
  return source.parts.flatMap((part, index) => {
    const place = [...around, index];
    return [place, ...placesIn(part.source, place)];
  });
}

/** Mixes within each other, the outermost counted: 0 for a source that is no mix. */
export function depthOf(source: Source): number {
  return source.kind === 'mix' ? 1 + Math.max(0, ...source.parts.map((part) => depthOf(part.source))) : 0;
}

function leavesOf(source: Source): number {
  return source.kind === 'mix' ? source.parts.reduce((sum, part) => sum + leavesOf(part.source), 0) : 1;
}

function partialsOf(source: Source): number {
  if (source.kind === 'mix') return source.parts.reduce((sum, part) => sum + partialsOf(part.source), 0);
  return source.kind === 'harmonics' ? source.partials.length : 0;
}

/** Why no part can be added to the mix at a place, or no copy of `what`; `undefined` where one can. */
export function noRoomFor(source: Source, around: Place, what?: Source): string | undefined {
  const mix = sourceAt(source, around);
  if (mix?.kind === 'mix' && mix.parts.length >= limits.mixParts.max)
    return `A mix holds at most ${limits.mixParts.max} parts.`;
  if (leavesOf(source) + (what === undefined ? 1 : leavesOf(what)) > limits.leafSources)
    return `A wave is made of at most ${limits.leafSources} sources in all.`;
  if (partialsOf(source) + (what === undefined ? 1 : partialsOf(what)) > limits.partialsInAll)
    return `A wave holds at most ${limits.partialsInAll.toLocaleString('en')} partials in all.`;
  return undefined;
}

/** Why the part at a place cannot become a mix of its own; `undefined` where it can. */
export function noDepthFor(source: Source, place: Place): string | undefined {
  const inner = sourceAt(source, place);
  return inner !== undefined && place.length + 1 + depthOf(inner) > limits.mixDepth
    ? `Mixes stand at most ${limits.mixDepth} deep in each other.`
    : undefined;
}
