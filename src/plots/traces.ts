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

function traceColumns(pen: Pen, area: PlotArea, values: Numbers, offset: number, floor?: number): void {
  const first = Math.max(0, Math.floor(area.from - offset));
  const last = Math.min(values.length, Math.ceil(area.to - offset) + 1);
  const scale = area.width / (area.to - area.from);
  let isFirst = true;
  let k = first;
  let x = 0;
  while (k < last) {
    const column = Math.floor((k + offset - area.from) * scale);
    const end = Math.min(last, Math.max(k + 1, Math.ceil((column + 1) / scale + area.from - offset)));
    const opening = values[k];
    let low = opening;
    let high = opening;
    for (k += 1; k < end; k += 1) {
      const value = values[k];
      if (value < low) low = value;
      else if (value > high) high = value;
    }
    x = area.left + column + 0.5;
    if (isFirst) {
      if (floor !== undefined) pen.move(x, floor);
      else pen.move(x, area.y(opening));
      isFirst = false;
    }
    if (floor !== undefined) {
      pen.line(x, area.y(low));
      continue;
    }
    pen.line(x, area.y(opening));
    if (high !== low) {
      pen.line(x, area.y(low));
      pen.line(x, area.y(high));
    }
    pen.line(x, area.y(values[end - 1]));
  }
  if (floor !== undefined && !isFirst) {
    pen.line(x, floor);
    pen.close();
  }
}
