import type { PlotArea } from './plot-area.ts';

const buckets = 64;

/** Where a label stands: its left end, its middle line, and the point of the curve it tells of. */
export interface LabelSpot {
  x: number;
  y: number;
  toX: number;
  toY: number;
}

/**
 * Finds room for labels beside a curve: knows how high and low the curve goes over each 64th of the width, and keeps a
 * label where it stood for as long as the place stays free, so that nothing jumps about while a wave is shaped.
 */
export class LabelRoom {
  private readonly top = new Float64Array(buckets);
  private readonly bottom = new Float64Array(buckets);
  private readonly last = new Map<string, number>();

  /** Measures the curve afresh: one value an entry, entry k at x = k + offset. */
  measure(area: PlotArea, values: ArrayLike<number>, offset: number): void {
    this.top.fill(Infinity);
    this.bottom.fill(-Infinity);
    this.include(area, values, offset);
  }

  /** Counts one more curve in. */
  include(area: PlotArea, values: ArrayLike<number>, offset: number): void {
    const first = Math.max(0, Math.floor(area.from - offset));
    const last = Math.min(values.length - 1, Math.ceil(area.to - offset));
    const scale = buckets / (area.to - area.from);
    let before = -1;
    for (let k = first; k <= last; k += 1) {
      const bucket = Math.min(buckets - 1, Math.max(0, Math.floor((k + offset - area.from) * scale)));
      const y = area.y(values[k]);
      // Few entries leave buckets between them: the line crosses those too.
      for (let b = before < 0 ? 0 : Math.min(before + 1, bucket); b <= bucket; b += 1) this.take(b, y);
      if (before >= 0) this.take(before, y);
      before = bucket;
    }
    for (let b = Math.max(0, before); b < buckets; b += 1) this.take(b, area.y(values[last]));
  }

  private take(bucket: number, y: number) {
    if (y < this.top[bucket]) this.top[bucket] = y;
    if (y > this.bottom[bucket]) this.bottom[bucket] = y;
  }

  /** A free place above or below the curve, or `null`. Sizes in the area's units. */
  find(
    area: PlotArea,
    name: string,
    side: 'above' | 'below',
    width: number,
    height: number,
    gap: number,
  ): LabelSpot | null {
    const step = area.width / buckets;
    const span = Math.ceil(width / step) + 1;
    const reach = (start: number) => {
      let edge = side === 'above' ? Infinity : -Infinity;
      for (let b = start; b < start + span; b += 1) {
        edge = side === 'above' ? Math.min(edge, this.top[b]) : Math.max(edge, this.bottom[b]);
      }
      return edge;
    };
    const costOf = (start: number) => {
      const edge = reach(start);
      const y = side === 'above' ? edge - gap - height : edge + gap + height;
      if (y < area.top + 2 || y > area.bottom - 2 || !Number.isFinite(edge)) return Infinity;
      const middle = start + Math.floor(span / 2);
      const own = side === 'above' ? this.top[middle] : this.bottom[middle];
      return Math.abs(own - edge);
    };

    let best = -1;
    let bestCost = Infinity;
    for (let start = 1; start + span < buckets; start += 1) {
      const cost = costOf(start);
      if (cost < bestCost) {
        best = start;
        bestCost = cost;
      }
    }
    if (best < 0) return null;
    const kept = this.last.get(name);
    if (kept !== undefined && kept + span < buckets && costOf(kept) < bestCost + height) best = kept;
    this.last.set(name, best);

    const middle = best + Math.floor(span / 2);
    const edge = reach(best);
    return {
      x: area.left + best * step,
      y: side === 'above' ? edge - gap - height / 2 : edge + gap + height / 2,
      toX: area.left + (middle + 0.5) * step,
      toY: side === 'above' ? this.top[middle] : this.bottom[middle],
    };
  }
}
