import type { Pen } from './pen.ts';
import type { PlotArea } from './plot-area.ts';

type Numbers = ArrayLike<number>;

/** More entries than pixel columns: a column then shows its first, lowest, highest and last value. */
export function isDense(area: PlotArea): boolean {
  return area.to - area.from > area.width;
}

/**
 * Lays a line through one value an entry, entry k at x = k + offset, joined round the seam of the loop. Begins the path;
 * the caller strokes it.
 */
export function traceLine(pen: Pen, area: PlotArea, values: Numbers, offset: number): void {
  pen.begin();
  if (isDense(area)) {
    traceColumns(pen, area, values, offset);
    return;
  }
  const length = values.length;
  const first = Math.max(-1, Math.floor(area.from - offset) - 1);
  const last = Math.min(length, Math.ceil(area.to - offset) + 1);
  for (let k = first; k <= last; k += 1) {
    const x = area.x(k + offset);
    const y = area.y(values[(k + length) % length]);
    if (k === first) pen.move(x, y);
    else pen.line(x, y);
  }
}

/**
 * Lays treads and risers, entry k from x = k to k + 1, on whole pixels shifted by `crisp` (half a pixel for lines of odd
 * width). Begins the path. With `floor` the path comes back along that y, to be filled.
 */
export function traceStairs(pen: Pen, area: PlotArea, values: Numbers, crisp: number, floor?: number): void {
  pen.begin();
  if (isDense(area)) {
    traceColumns(pen, area, values, 0, floor);
    return;
  }
  const first = Math.max(0, Math.floor(area.from));
  const last = Math.min(values.length, Math.ceil(area.to));
  let x = Math.round(area.x(first)) + crisp;
  if (floor !== undefined) pen.move(x, floor);
  for (let k = first; k < last; k += 1) {
    const y = Math.round(area.y(values[k])) + crisp;
    if (k === first && floor === undefined) pen.move(x, y);
    else pen.line(x, y);
    // A run of one code is one tread.
    while (k + 1 < last && values[k + 1] === values[k]) k += 1;
    x = Math.round(area.x(k + 1)) + crisp;
    pen.line(x, y);
  }
  if (floor !== undefined) {
    pen.line(x, floor);
    pen.close();
  }
}

/** A column that rises and falls by less than this many pixels is one corner, in the middle. */
const flatPx = 0.5;

/**
 * One column of pixels after the other, in one corner or two: its lowest and its highest value, in the order in which
 * they come. With `floor` the path keeps to the end that lies nearer to it, and what is beyond is left to the line. A
 * path is as dear to draw as it has corners.
 */
function traceColumns(pen: Pen, area: PlotArea, values: Numbers, offset: number, floor?: number): void {
  const first = Math.max(0, Math.floor(area.from - offset));
  const last = Math.min(values.length, Math.ceil(area.to - offset) + 1);
  const scale = area.width / (area.to - area.from);
  const path = new ColumnPath(pen);
  if (floor !== undefined) path.to(area.left + Math.floor((first + offset - area.from) * scale) + 0.5, floor);
  let k = first;
  while (k < last) {
    const begin = k;
    const column = Math.floor((k + offset - area.from) * scale);
    const end = Math.min(last, Math.max(k + 1, Math.ceil((column + 1) / scale + area.from - offset)));
    let low = k;
    let high = k;
    for (k += 1; k < end; k += 1) {
      if (values[k] < values[low]) low = k;
      else if (values[k] > values[high]) high = k;
    }
    const [bottom, top] = [area.y(values[low]), area.y(values[high])];
    const x = area.left + column + 0.5;
    if (floor !== undefined) path.to(x, Math.min(bottom, Math.max(top, floor)));
    else if (bottom - top < flatPx) path.to(x, (bottom + top) / 2);
    else if (Math.abs(high - low) === end - begin - 1) {
      // It runs from end to end, so it is drawn as the slope that it is.
      path.to(area.x(begin + offset), area.y(values[begin]));
      path.to(area.x(end - 1 + offset), area.y(values[end - 1]));
    } else {
      path.to(x, low < high ? bottom : top);
      path.to(x, low < high ? top : bottom);
    }
  }
  path.end(floor);
}

/** A path whose level stretches have no corners inside. */
class ColumnPath {
  private readonly pen: Pen;
  private x = NaN;
  private y = NaN;
  private isLevel = false;

  constructor(pen: Pen) {
    this.pen = pen;
  }

  to(x: number, y: number): void {
    if (Number.isNaN(this.x)) this.pen.move(x, y);
    else if (y === this.y) this.isLevel = true;
    else {
      this.endLevel();
      this.pen.line(x, y);
    }
    this.x = x;
    this.y = y;
  }

  end(floor?: number): void {
    this.endLevel();
    if (floor === undefined || Number.isNaN(this.x)) return;
    this.pen.line(this.x, floor);
    this.pen.close();
  }

  private endLevel(): void {
    if (this.isLevel) this.pen.line(this.x, this.y);
    this.isLevel = false;
  }
}
