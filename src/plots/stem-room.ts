import type { PlotArea } from './plot-area.ts';
import type { StemScale } from './stems.ts';

const columns = 96;

/** Where a label is free to stand, in the area's units: its left end and its middle line. */
export interface StemLabelSpot {
  left: number;
  y: number;
}

interface Box {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/**
 * Finds room for labels over a field of stems: knows how high the stems of each column reach, and where labels stand
 * already. A label keeps its place for as long as that is nearly as good as the best, so that nothing jumps about while
 * a wave is shaped.
 */
export class StemRoom {
  private readonly top = new Float64Array(columns);
  private readonly last = new Map<string, number>();
  private taken: Box[] = [];

  /** Measures the stems afresh, those of several spectra over the same bins. */
  measure(area: PlotArea, scale: StemScale, spectra: readonly Float64Array[], firstBin: number): void {
    this.taken = [];
    const perColumn = (area.to - area.from) / columns;
    for (let column = 0; column < columns; column += 1) {
      const from = scale.binAt(area.from + column * perColumn);
      const to = scale.binAt(area.from + (column + 1) * perColumn);
      const strongest = Math.max(...spectra.map((lines) => strongestWithin(lines, firstBin, from, to)));
      this.top[column] =
        strongest < 0 ? area.bottom : Math.min(area.bottom, area.y(scale.heightOf(strongest)));
    }
  }

  /**
   * A place for a label near the head of a stem: beside it or above it, clear of stems and of other labels; `null` where
   * there is none. `height` is the label's, `head` the room that heads need.
   */
  find(
    area: PlotArea,
    name: string,
    at: { x: number; y: number },
    { width, height, head }: { width: number; height: number; head: number },
  ): StemLabelSpot | null {
    const step = area.width / columns;
    const span = Math.ceil(width / step) + 1;
    const spotAt = (start: number): StemLabelSpot | null => {
      const left = area.left + start * step + (step * span - width) / 2;
      let reach = area.bottom;
      for (let column = start; column < start + span; column += 1) reach = Math.min(reach, this.top[column]);
      // No lower than the head it belongs to: below it would name another line.
      const y = Math.min(reach - head - height / 2, at.y);
      if (y - height / 2 < area.top) return null;
      const box = boxOf({ left, y }, width, height);
      return this.taken.some((other) => overlap(box, other)) ? null : { left, y };
    };
    const costOf = (start: number) => {
      const spot = spotAt(start);
      if (spot === null) return Infinity;
      const { left, right } = boxOf(spot, width, height);
      return Math.max(0, left - at.x, at.x - right) + 2 * Math.abs(at.y - spot.y);
    };

    let best = -1;
    let least = Infinity;
    for (let start = 0; start + span <= columns; start += 1) {
      const cost = costOf(start);
      if (cost < least) [best, least] = [start, cost];
    }
    const kept = this.last.get(name);
    if (kept !== undefined && kept + span <= columns && costOf(kept) < least + 2 * height) best = kept;
    const spot = best < 0 ? null : spotAt(best);
    if (spot === null) return null;
    this.last.set(name, best);
    this.taken.push(boxOf(spot, width, height));
    return spot;
  }
}

/** −1 where no bin lies there. */
function strongestWithin(lines: Float64Array, firstBin: number, from: number, to: number): number {
  let strongest = -1;
  const last = Math.min(lines.length - 1, Math.floor(to));
  for (let bin = Math.max(firstBin, Math.ceil(from)); bin <= last; bin += 1) {
    if (lines[bin] > strongest) strongest = lines[bin];
  }
  return strongest;
}

function boxOf({ left, y }: StemLabelSpot, width: number, height: number): Box {
  return { left, right: left + width, top: y - height / 2, bottom: y + height / 2 };
}

function overlap(one: Box, other: Box): boolean {
  return one.left < other.right && other.left < one.right && one.top < other.bottom && other.top < one.bottom;
}
