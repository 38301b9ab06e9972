import { formatQuantity } from '../../../../shared/quantities/index.ts';
import {
  decimalTicks,
  tickText,
  traceLine,
  traceStairs,
  type AxisSpec,
  type Pen,
  type PlotArea,
  type PlotTheme,
  type ReadOut,
  type Scene,
} from '../../../plots/index.ts';

export interface Trace {
  readonly name: string;
  readonly values: Float64Array;
  readonly color: 'brick' | 'water' | 'ink';
  /** Told apart by more than colour. */
  readonly dash?: readonly number[];
  readonly width: number;
  /** Treads from one item to the next in place of a line through them. */
  readonly isStairs?: boolean;
}

/** Values over evenly spaced places. */
export interface TracesData {
  readonly traces: readonly [Trace, ...Trace[]];
  /** Place of item 0, and the distance of items, in the unit of x. */
  readonly from: number;
  readonly step: number;
  readonly x: { readonly name: string; readonly unit: string };
  readonly y: { readonly name: string; readonly unit: string };
  /** Heights that are always in sight. */
  readonly reach?: readonly [number, number];
  /** Lines across the drawing. */
  readonly levels?: readonly number[];
  readonly summary: string;
}

const keyPx = 20;
const letterPx = 7;

/** One or more traces over the same places: voltages over time, INL and DNL over codes, builds over a figure. */
export class TracesScene implements Scene<TracesData> {
  readonly leastSpan = 4;
  readonly axes: readonly AxisSpec[];
  private data: TracesData;
  private range: readonly [number, number] = [0, 1];

  constructor(data: TracesData) {
    this.data = data;
    this.set(data);
    const { x, y } = data;
    const named = ({ name, unit }: { name: string; unit: string }) => (unit ? `${name} in ${unit}` : name);
    this.axes = [
      {
        side: 'left',
        title: named(y),
        ticks: (min, max, px) => decimalTicks(min, max, Math.min(5, px / 28)),
        text: tickText,
        hasGrid: true,
      },
      {
        side: 'bottom',
        title: x.unit === 's' ? x.name : named(x),
        ticks: (min, max, px) => {
          const { from, step } = this.data;
          // The title stands at the end of the axis.
          const last = max - ((max - min) / px) * letterPx * named(x).length;
          const places = decimalTicks(from + min * step, from + last * step, Math.min(5, px / 72));
          return places.map((place) => (place - from) / step);
        },
        text: (item) => {
          const place = Number((this.data.from + item * this.data.step).toPrecision(6));
          return x.unit === 's' ? formatQuantity(place, 's', { significant: 4 }) : tickText(place);
        },
      },
    ];
  }

  set(data: TracesData): void {
    this.data = data;
    let [low, high] = data.reach ?? [Infinity, -Infinity];
    for (const { values } of data.traces) {
      for (const value of values) {
        if (value < low) low = value;
        if (value > high) high = value;
      }
    }
    const room = 0.05 * (high - low || 1);
    // Names of traces stand above them.
    const above = this.data.traces.length > 1 ? 2 * this.data.traces.length * room : room;
    this.range = [low - (low === 0 ? 0 : room), high + above];
  }

  private get last(): number {
    return this.data.traces[0].values.length - 1;
  }

  extent(): readonly [number, number] {
    return [0, this.data.traces[0].isStairs ? this.last + 1 : Math.max(1, this.last)];
  }

  yRange(): readonly [number, number] {
    return this.range;
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { unit } = area;
    for (const level of this.data.levels ?? []) {
      const y = Math.round(area.y(level)) + 0.5;
      pen.begin();
      pen.move(area.left, y);
      pen.line(area.right, y);
      pen.stroke(theme.line, unit, [4 * unit, 4 * unit]);
    }
    for (const { values, color, width, dash, isStairs } of this.data.traces) {
      if (isStairs) traceStairs(pen, area, values, 0.5);
      else traceLine(pen, area, values, 0);
      pen.stroke(
        theme[color],
        width * unit,
        dash?.map((each) => each * unit),
      );
    }
    if (this.data.traces.length > 1) this.names(pen, area, theme);
  }

  private names(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { unit } = area;
    this.data.traces.forEach(({ name, color, width, dash }, index) => {
      const left = area.right - (name.length * letterPx + keyPx + 8) * unit;
      const y = area.top + (10 + 17 * index) * unit;
      pen.begin();
      pen.move(left, y);
      pen.line(left + 14 * unit, y);
      pen.stroke(
        theme[color],
        width * unit,
        dash?.map((each) => each * unit),
      );
      pen.text(name, left + keyPx * unit, y, { color: theme[color], weight: 650, halo: theme.paper });
    });
  }

  items(): readonly [number, number] {
    return [0, this.last];
  }

  itemAt(x: number): number {
    const item = this.data.traces[0].isStairs ? Math.floor(x) : Math.round(x);
    return Math.min(this.last, Math.max(0, item));
  }

  spanOf(item: number): readonly [number, number] {
    return this.data.traces[0].isStairs ? [item, item + 1] : [item - 0.5, item + 0.5];
  }

  marksAt(item: number): readonly { x: number; y: number }[] {
    const half = this.data.traces[0].isStairs ? 0.5 : 0;
    return this.data.traces.map(({ values }) => ({ x: item + half, y: values[item] }));
  }

  readOut(item: number): readonly ReadOut[] {
    const { from, step, x, y, traces } = this.data;
    if (item > this.last) return [];
    return [
      { label: x.name, value: formatQuantity(from + item * step, x.unit, { significant: 5 }) },
      ...traces.map(({ name, values }) => ({
        label: name,
        value: formatQuantity(values[item], y.unit, { significant: 5 }),
      })),
    ];
  }

  summary(): string {
    return this.data.summary;
  }

  csv(): string {
    const { from, step, x, y, traces } = this.data;
    const named = (name: string, unit: string) =>
      `${name} ${unit}`.trim().toLowerCase().replace(/\W+/g, '_').replace(/_$/, '');
    const rows = [[named(x.name, x.unit), ...traces.map(({ name }) => named(name, y.unit))].join(',')];
    for (let item = 0; item <= this.last; item += 1)
      rows.push([from + item * step, ...traces.map(({ values }) => values[item])].join(','));
    return `${rows.join('\n')}\n`;
  }
}
