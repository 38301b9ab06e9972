import type { PlotLink } from '../../../plots/index.ts';

/** The part of the table that is zoomed to, in entries; `null` for the whole. */
export type Sight = ReturnType<PlotLink['view']>;

/** Reads the part in sight from the URL's `sight`: `12.5-80`, in entries. What is no part shows the whole. */
export function readSight(text: string | null): Sight {
  const [, from, to] = /^(\d{1,6}(?:\.\d{1,3})?)-(\d{1,6}(?:\.\d{1,3})?)$/.exec(text ?? '') ?? [];
  if (from === undefined || !(Number(from) < Number(to))) return null;
  return { from: Number(from), to: Number(to) };
}

/** Writes it to a thousandth of an entry; `null`, no parameter at all, for the whole. */
export function writeSight(sight: Sight): string | null {
  if (sight === null) return null;
  const places = (entry: number) => Number(Math.max(0, entry).toFixed(3));
  return `${places(sight.from)}-${places(sight.to)}`;
}
