import type { Pen } from './pen.ts';
import type { PlotArea } from './plot-area.ts';

export interface StemStyle {
  color: string;
  width: number;
  head: 'disc' | 'diamond';
  radius: number;
}

/** The scales stems stand on. */
export interface StemScale {
  heightOf(amplitude: number): number;
  placeOf(bin: number): number;
  binAt(x: number): number;
}

/** Heads shrink to this share of the room between lines, and are left out where that is less than this. */
const headShare = 0.44;
const leastRadius = 2.2;

/** Stems of the lines that have room, bins first ≤ bin < end. */
export function drawStems(
  pen: Pen,
  area: PlotArea,
  scale: StemScale,
  amplitudes: Float64Array,
  first: number,
  end: number,
  style: StemStyle,
): void {
  pen.begin();
  for (let bin = first; bin < end; bin += 1) {
    const y = area.y(scale.heightOf(amplitudes[bin]));
    if (y >= area.bottom) continue;
    const x = area.x(scale.placeOf(bin));
    if (x > area.right) break;
    pen.move(x, area.bottom);
    pen.line(x, y);
  }
  pen.stroke(style.color, style.width);
}

/** Heads of the same lines, smaller where they would touch. */
export function drawHeads(
  pen: Pen,
  area: PlotArea,
  scale: StemScale,
  amplitudes: Float64Array,
  first: number,
  end: number,
  style: StemStyle,
): void {
  pen.begin();
  for (let bin = first; bin < end; bin += 1) {
    const y = area.y(scale.heightOf(amplitudes[bin]));
    if (y >= area.bottom) continue;
    const x = area.x(scale.placeOf(bin));
    if (x > area.right + style.radius) break;
    const spacing = area.x(scale.placeOf(bin + 1)) - x;
    const radius = Math.min(style.radius, headShare * spacing);
    if (radius >= leastRadius * area.unit) layHead(pen, style, x, y, radius);
    else if (standsOut(amplitudes, bin)) layHead(pen, style, x, y, style.radius);
  }
  pen.fill(style.color);
}

/** Lines that stand closer than they can be drawn: each column of pixels reaches to the strongest of its lines. */
export function drawColumns(
  pen: Pen,
  area: PlotArea,
  scale: StemScale,
  amplitudes: Float64Array,
  first: number,
  style: StemStyle,
): void {
  if (first >= amplitudes.length) return;
  const start = Math.max(0, Math.floor(area.x(scale.placeOf(first)) - area.left));
  const perColumn = (area.to - area.from) / area.width;
  let bin = first;
  pen.begin();
  for (let column = start; column < area.width && bin < amplitudes.length; column += 1) {
    const end = Math.min(amplitudes.length, Math.ceil(scale.binAt(area.from + (column + 1) * perColumn)));
    if (end <= bin) continue;
    let strongest = bin;
    for (; bin < end; bin += 1) if (amplitudes[bin] > amplitudes[strongest]) strongest = bin;
    const y = area.y(scale.heightOf(amplitudes[strongest]));
    if (y >= area.bottom) continue;
    const x = area.left + column + 0.5;
    pen.move(x, area.bottom);
    pen.line(x, y);
  }
  pen.stroke(style.color, style.head === 'disc' ? style.width : Math.max(1, area.unit));

  pen.begin();
  for (bin = first; bin < amplitudes.length; bin += 1) {
    if (amplitudes[bin] <= leastHead || !standsOut(amplitudes, bin, crowdIsolation)) continue;
    const y = area.y(scale.heightOf(amplitudes[bin]));
    if (y < area.bottom && style.head === 'disc')
      layHead(pen, style, area.x(scale.placeOf(bin)), y, style.radius);
  }
  pen.fill(style.color);
}

/** Amplitudes below this are never shown; spares their logarithm. */
const leastHead = 1e-8;
/** How many times both its neighbours a line must be to keep its head among others; more in a crowd, which is noisy. */
const isolation = 2;
const crowdIsolation = 20;

function standsOut(amplitudes: Float64Array, bin: number, times = isolation): boolean {
  const here = amplitudes[bin];
  return here > times * (amplitudes[bin - 1] ?? 0) && here > times * (amplitudes[bin + 1] ?? 0);
}

/** Lays one head's outline. */
export function layHead(pen: Pen, style: StemStyle, x: number, y: number, radius: number) {
  const corners = style.head === 'diamond' ? 4 : 16;
  for (let corner = 0; corner < corners; corner += 1) {
    const angle = (2 * Math.PI * corner) / corners;
    const cx = x + radius * Math.sin(angle);
    const cy = y - radius * Math.cos(angle);
    if (corner === 0) pen.move(cx, cy);
    else pen.line(cx, cy);
  }
  pen.close();
}
