import { levelAt, type ResponsePoint } from '../../../../../shared/listening/device-response.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import {
  decimalTicks,
  logTicks,
  tickText,
  type AxisSpec,
  type Pen,
  type PlotArea,
  type PlotTheme,
  type ReadOut,
  type Scene,
} from '../../../../plots/index.ts';

export interface ResponseData {
  readonly name: string;
  /** Without problems. */
  readonly points: readonly ResponsePoint[];
}

/** What is always in sight: hearing, and 40 dB. */
const hearingHz = { low: 20, high: 20_000 } as const;
const leastDepth = 40;
const topDb = 5;
const titleRoom = 12;

/** A response curve over the logarithm of frequency, its strongest point at 0 dB. */
export class ResponseScene implements Scene<ResponseData> {
  /** An octave. */
  readonly leastSpan = Math.log10(2);
  readonly axes: readonly AxisSpec[];
  private data: ResponseData;
  private top = 0;
  private lowest = 0;

  constructor(data: ResponseData) {
    this.data = data;
    this.set(data);
    this.axes = [
      {
        side: 'left',
        title: 'level in dB',
        ticks: (min, max, px) => decimalTicks(min, Math.min(0, max), Math.min(5, px / 28)),
        text: tickText,
        hasGrid: true,
      },
      {
        side: 'bottom',
        title: 'f in Hz',
        ticks: (min, max, px) => logTicks(min, max - ((max - min) / px) * titleRoom, px / 48),
        text: (place) => tickText(Number((10 ** place).toPrecision(6))).replace(/000$/, 'k'),
        hasGrid: true,
      },
    ];
  }

  set(data: ResponseData): void {
    this.data = data;
    this.top = data.points.reduce((most, { db }) => Math.max(most, db), -Infinity);
    this.lowest = data.points.reduce((least, { db }) => Math.min(least, db), Infinity) - this.top;
  }

  private get ends(): readonly [ResponsePoint, ResponsePoint] {
    const { points } = this.data;
    return [points[0], points[points.length - 1]];
  }

  extent(): readonly [number, number] {
    const [first, last] = this.ends;
    return [Math.log10(Math.min(hearingHz.low, first.hz)), Math.log10(Math.max(hearingHz.high, last.hz))];
  }

  yRange(): readonly [number, number] {
    return [-10 * Math.ceil(Math.max(leastDepth, 3 - this.lowest) / 10), topDb];
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { unit } = area;
    const { points } = this.data;
    const [first, last] = this.ends;
    const x = (hz: number) => area.x(Math.log10(hz));
    const y = (db: number) => area.y(db - this.top);
    pen.begin();
    points.forEach(({ hz, db }, index) => (index === 0 ? pen.move(x(hz), y(db)) : pen.line(x(hz), y(db))));
    pen.stroke(theme.water, 2 * unit);
    // Beyond the ends nothing is known: the end's level goes on.
    pen.begin();
    pen.move(area.left, y(first.db));
    pen.line(x(first.hz), y(first.db));
    pen.move(x(last.hz), y(last.db));
    pen.line(area.right, y(last.db));
    pen.stroke(theme.water, unit, [3 * unit, 4 * unit]);
    if (points.length > 64) return;
    for (const { hz, db } of points) pen.disc(x(hz), y(db), 3 * unit, theme.water);
  }

  items(): readonly [number, number] {
    return [0, this.data.points.length - 1];
  }

  itemAt(place: number): number {
    const { points } = this.data;
    const distance = (index: number) => Math.abs(Math.log10(points[index].hz) - place);
    let nearest = 0;
    for (let index = 1; index < points.length; index += 1)
      if (distance(index) < distance(nearest)) nearest = index;
    return nearest;
  }

  spanOf(item: number): readonly [number, number] {
    const place = this.placeOf(item);
    return [place - 0.01, place + 0.01];
  }

  private placeOf(item: number): number {
    const { points } = this.data;
    return Math.log10(points[Math.min(item, points.length - 1)].hz);
  }

  marksAt(item: number): readonly { x: number; y: number }[] {
    const { points } = this.data;
    return item < points.length ? [{ x: this.placeOf(item), y: points[item].db - this.top }] : [];
  }

  readOut(item: number): readonly ReadOut[] {
    const { points } = this.data;
    if (item >= points.length) return [];
    return [
      { label: 'frequency', value: hertz(points[item].hz) },
      { label: 'level', value: decibels(points[item].db - this.top) },
    ];
  }

  summary(): string {
    const { name, points } = this.data;
    const at = (hz: number) => `${decibels(levelAt(points, hz) - this.top)} at ${hertz(hz)}`;
    const strongest = points.find(({ db }) => db === this.top) ?? points[0];
    const [first, last] = this.ends;
    return (
      `${name}: ${points.length} points from ${hertz(first.hz)} to ${hertz(last.hz)}. Strongest at ` +
      `${hertz(strongest.hz)}, which is 0 dB; ${[100, 300, 1_000, 3_000, 10_000].map(at).join(', ')}.`
    );
  }

  csv(): string {
    return `frequency_hz,level_db\n${this.data.points.map(({ hz, db }) => `${hz},${db}\n`).join('')}`;
  }
}

const hertz = (hz: number) => formatQuantity(hz, 'Hz', { significant: 4 });
const decibels = (db: number) => formatQuantity(db, 'dB', { decimals: 1 });
