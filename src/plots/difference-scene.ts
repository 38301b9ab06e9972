import { formatQuantity } from '../../shared/quantities/index.ts';
import { entryTicks } from './cycle-scene.ts';
import type { Pen } from './pen.ts';
import type { PlotArea } from './plot-area.ts';
import type { PlotTheme } from './plot-theme.ts';
import type { AxisSpec, ReadOut, Scene } from './scene.ts';
import { tickText } from './ticks.ts';
import { isDense, traceStairs } from './traces.ts';

export interface DifferenceData {
  /** Later less earlier, one value an entry. */
  readonly differences: Float64Array;
  readonly unit: 'codes' | 'LSB';
}

/** What became of each entry between two tables: up from the middle line is more, down is less. */
export class DifferenceScene implements Scene<DifferenceData> {
  readonly leastSpan = 4;
  readonly axes: readonly AxisSpec[];
  private data: DifferenceData;
  private worst = 0;

  constructor(data: DifferenceData) {
    this.data = data;
    this.set(data);
    this.axes = [
      {
        side: 'left',
        title: `difference in ${data.unit}`,
        ticks: (_min, max) => [-roundBelow(max), 0, roundBelow(max)],
        text: tickText,
      },
      {
        side: 'bottom',
        title: 'entry',
        ticks: (min, max, px) => entryTicks(this.data.differences.length, min, max, px),
        text: tickText,
      },
    ];
  }

  set(data: DifferenceData): void {
    this.data = data;
    const { differences } = data;
    this.worst = 0;
    for (let k = 1; k < differences.length; k += 1)
      if (Math.abs(differences[k]) > Math.abs(differences[this.worst])) this.worst = k;
  }

  extent(): readonly [number, number] {
    return [0, this.data.differences.length];
  }

  yRange(): readonly [number, number] {
    const reach = Math.max(1, Math.abs(this.data.differences[this.worst])) * 1.15;
    return [-reach, reach];
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { differences } = this.data;
    const { unit } = area;
    const zero = Math.round(area.y(0));
    traceStairs(pen, area, differences, 0, zero);
    pen.fill(theme.brickWash);
    pen.begin();
    pen.move(area.left, zero + 0.5);
    pen.line(area.right, zero + 0.5);
    pen.stroke(theme.line, unit);
    const width = Math.max(1, Math.round(1.4 * unit));
    traceStairs(pen, area, differences, isDense(area) || width % 2 === 0 ? 0 : 0.5);
    pen.stroke(theme.brick, width);
  }

  items(): readonly [number, number] {
    return [0, this.data.differences.length - 1];
  }

  itemAt(x: number): number {
    return Math.floor(x);
  }

  spanOf(item: number): readonly [number, number] {
    return [item, item + 1];
  }

  marksAt(): readonly { x: number; y: number }[] {
    return [];
  }

  readOut(item: number): readonly ReadOut[] {
    return [
      { label: 'entry', value: String(item) },
      { label: 'difference', value: this.say(item) },
    ];
  }

  summary(): string {
    let differing = 0;
    for (const each of this.data.differences) if (each !== 0) differing += 1;
    return (
      `${differing} of ${this.data.differences.length} entries differ. ` +
      (differing === 0 ? '' : `The most at entry ${this.worst}, by ${this.say(this.worst)}.`)
    );
  }

  csv(): string {
    const rows = [`entry,difference_${this.data.unit.toLowerCase()}`];
    this.data.differences.forEach((difference, k) => rows.push(`${k},${difference}`));
    return `${rows.join('\n')}\n`;
  }

  private say(item: number): string {
    const { differences, unit } = this.data;
    const sign = differences[item] > 0 ? '+' : '';
    return sign + formatQuantity(differences[item], unit, { significant: 4 });
  }
}

/** The largest 1, 2 or 5 times a power of ten that is at most `value`. */
function roundBelow(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  const lead = value / power;
  return power * (lead >= 5 ? 5 : lead >= 2 ? 2 : 1);
}
