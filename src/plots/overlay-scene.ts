import { formatQuantity } from '../../shared/quantities/index.ts';
import { entryTicks } from './cycle-scene.ts';
import { LabelRoom } from './label-place.ts';
import { wordsPx, type Pen } from './pen.ts';
import { PlotArea } from './plot-area.ts';
import type { PlotTheme } from './plot-theme.ts';
import type { AxisSpec, ReadOut, Scene } from './scene.ts';
import { decimalTicks, tickText } from './ticks.ts';
import { isDense, traceStairs } from './traces.ts';

/** One of two tables that are drawn over each other. */
export interface OverlaidTable {
  /** Said beside its stairs. */
  readonly name: string;
  /** What the codes stand for. */
  readonly values: Float64Array;
  readonly codes: Uint16Array;
  readonly range: 'bipolar' | 'unipolar';
}

export interface OverlayData {
  readonly a: OverlaidTable;
  readonly b: OverlaidTable;
}

const margin = 0.07;
/** Room above and below what is in sight, as a share of its range. */
const zoomedRoom = 0.2;
const letterPx = 7;

/**
 * The stairs of two tables: the later ones as masonry with a whole line, the earlier ones as a dashed line over them.
 * A place on x is an entry of the later table; a table of another length is stretched to it, start to start.
 */
export class OverlayScene implements Scene<OverlayData> {
  readonly leastSpan = 4;
  readonly axes: readonly AxisSpec[] = [
    {
      side: 'left',
      title: 'signal, full scale = 1',
      ticks: (min, max, px) => decimalTicks(min, max, px / 36),
      text: tickText,
      hasGrid: true,
    },
    {
      side: 'bottom',
      title: 'entry',
      ticks: (min, max, px) => entryTicks(this.length, min, max, px),
      text: tickText,
    },
  ];
  private data: OverlayData;
  private readonly room = new LabelRoom();
  private readonly stretched = new PlotArea();

  constructor(data: OverlayData) {
    this.data = data;
  }

  set(data: OverlayData): void {
    this.data = data;
  }

  extent(): readonly [number, number] {
    return [0, this.length];
  }

  yRange(from: number, to: number): readonly [number, number] {
    const { a, b } = this.data;
    if (to - from >= this.length) {
      const bottom = a.range === 'bipolar' || b.range === 'bipolar' ? -1 : 0;
      const room = (1 - bottom) * margin;
      return [bottom - room, 1 + room];
    }
    let low = Infinity;
    let high = -Infinity;
    for (const { values } of [a, b]) {
      const scale = values.length / this.length;
      const last = Math.min(values.length, Math.ceil(to * scale));
      for (let k = Math.max(0, Math.floor(from * scale)); k < last; k += 1) {
        low = Math.min(low, values[k]);
        high = Math.max(high, values[k]);
      }
    }
    const room = Math.max((high - low) * zoomedRoom, 1e-4);
    return [low - room, high + room];
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { a, b } = this.data;
    const { unit } = area;
    const width = Math.max(1, Math.round(1.6 * unit));
    const crispIn = (each: PlotArea) => (isDense(each) || width % 2 === 0 ? 0 : 0.5);
    traceStairs(pen, area, b.values, 0, area.bottom);
    pen.fill(theme.brickWash);
    traceStairs(pen, area, b.values, crispIn(area));
    pen.stroke(theme.brick, width);

    const over = this.stretch(area);
    traceStairs(pen, over, a.values, crispIn(over));
    pen.stroke(theme.ink, width, [6 * unit, 4 * unit]);
    this.drawLabels(pen, area, theme);
  }

  items(): readonly [number, number] {
    return [0, this.length - 1];
  }

  itemAt(x: number): number {
    return Math.floor(x);
  }

  spanOf(item: number): readonly [number, number] {
    return [item, item + 1];
  }

  marksAt(item: number): readonly { x: number; y: number }[] {
    const { a, b } = this.data;
    return [
      { x: item + 0.5, y: a.values[this.entryOfA(item)] },
      { x: item + 0.5, y: b.values[item] },
    ];
  }

  readOut(item: number): readonly ReadOut[] {
    const { a, b } = this.data;
    const say = (table: OverlaidTable, entry: number) =>
      `${table.codes[entry]}, ${formatQuantity(table.values[entry], '', { decimals: 5 })}`;
    return [
      { label: 'entry', value: String(item) },
      { label: a.name, value: say(a, this.entryOfA(item)) },
      { label: b.name, value: say(b, item) },
    ];
  }

  summary(): string {
    const { a, b } = this.data;
    let worst = 0;
    for (let k = 0; k < b.values.length; k += 1) if (this.gapAt(k) > this.gapAt(worst)) worst = k;
    const lengths =
      a.values.length === b.values.length
        ? `${b.values.length} entries each`
        : `${a.values.length} and ${b.values.length} entries, drawn over the same width`;
    const gap = formatQuantity(this.gapAt(worst), '', { significant: 3 });
    return `The stairs of ${a.name} (dashed) and ${b.name} (whole line): ${lengths}. They lie furthest apart at entry ${worst}, by ${gap} of full scale.`;
  }

  csv(): string {
    const { a, b } = this.data;
    const rows = ['entry,first_code,first_value,second_code,second_value'];
    for (let k = 0; k < this.length; k += 1) {
      const entry = this.entryOfA(k);
      rows.push(`${k},${a.codes[entry]},${a.values[entry]},${b.codes[k]},${b.values[k]}`);
    }
    return `${rows.join('\n')}\n`;
  }

  private get length(): number {
    return this.data.b.values.length;
  }

  private entryOfA(item: number): number {
    return Math.floor((item * this.data.a.values.length) / this.length);
  }

  private gapAt(item: number): number {
    return Math.abs(this.data.b.values[item] - this.data.a.values[this.entryOfA(item)]);
  }

  /** The same rectangle, with places of the earlier table's own entries. */
  private stretch(area: PlotArea): PlotArea {
    const scale = this.data.a.values.length / this.length;
    this.stretched.place(area.left, area.top, area.width, area.height, area.unit);
    this.stretched.scale(area.from * scale, area.to * scale, area.low, area.high);
    return this.stretched;
  }

  /** Says which stairs are which, beside them and with a piece of their line. */
  private drawLabels(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { a, b } = this.data;
    const { unit } = area;
    const line = 22 * unit;
    this.room.measure(area, b.values, 0.5);
    this.room.include(this.stretch(area), a.values, 0.5);
    const labels = [
      { name: a.name, side: 'above', color: theme.ink, halo: theme.paper, dash: [6 * unit, 4 * unit] },
      { name: b.name, side: 'below', color: theme.brick, halo: theme.brickWash, dash: [] },
    ] as const;
    labels.forEach(({ name, side, color, halo, dash }, index) => {
      const width = name.length * letterPx * unit + line;
      const spot = this.room.find(area, name, side, width, wordsPx * unit, 9 * unit);
      const x = spot?.x ?? area.left + 10 * unit;
      const y = spot?.y ?? area.top + (12 + 17 * index) * unit;
      pen.begin();
      pen.move(x, y);
      pen.line(x + line - 6 * unit, y);
      pen.stroke(color, 2 * unit, dash);
      pen.text(name, x + line, y, { color, halo: spot ? halo : theme.paper, weight: 650 });
    });
  }
}
