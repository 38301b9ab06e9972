import { formatQuantity } from '../../shared/quantities/index.ts';
import { entryTicks } from './cycle-scene.ts';
import type { Pen } from './pen.ts';
import type { PlotArea } from './plot-area.ts';
import type { PlotTheme } from './plot-theme.ts';
import type { AxisSpec, ReadOut, Scene } from './scene.ts';
import { decimalTicks, tickText } from './ticks.ts';
import { isDense, traceStairs } from './traces.ts';

/** Heights of the scale, so that it keeps still while a wave is shaped. */
const reaches = [0.75, 1.25, 2.5, 5, 10, 25, 50, 100];

/** What quantising did to each entry, in LSB, between the lines that rounding alone never crosses. */
export class ErrorScene implements Scene<Float64Array> {
  readonly leastSpan = 4;
  readonly axes: readonly AxisSpec[];
  private error: Float64Array;
  private worst = 0;

  constructor(error: Float64Array) {
    this.error = error;
    this.set(error);
    this.axes = [
      {
        side: 'left',
        title: 'error in LSB',
        ticks: (min, max, px) =>
          max <= 1.25 ? [-0.5, 0, 0.5] : decimalTicks(min, max, Math.min(4, px / 22)),
        text: tickText,
      },
      {
        side: 'bottom',
        title: 'entry',
        ticks: (min, max, px) => entryTicks(this.error.length, min, max, px),
        text: tickText,
      },
    ];
  }

  set(error: Float64Array): void {
    this.error = error;
    this.worst = 0;
    for (let k = 1; k < error.length; k += 1) {
      if (Math.abs(error[k]) > Math.abs(error[this.worst])) this.worst = k;
    }
  }

  extent(): readonly [number, number] {
    return [0, this.error.length];
  }

  yRange(): readonly [number, number] {
    const peak = Math.abs(this.error[this.worst]) * 1.04;
    const reach = reaches.find((each) => each >= peak) ?? 10 ** Math.ceil(Math.log10(peak));
    return [-reach, reach];
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { unit } = area;
    const zero = Math.round(area.y(0));
    traceStairs(pen, area, this.error, 0, zero);
    pen.fill(theme.brickWash);
    this.level(pen, area, zero + 0.5, theme.line);
    for (const half of [0.5, -0.5])
      this.level(pen, area, Math.round(area.y(half)) + 0.5, theme.line, [4 * unit, 4 * unit]);
    const width = Math.max(1, Math.round(1.4 * unit));
    traceStairs(pen, area, this.error, isDense(area) || width % 2 === 0 ? 0 : 0.5);
    pen.stroke(theme.brick, width);
    if (this.error[this.worst] === 0) this.sayExact(pen, area, theme);
  }

  items(): readonly [number, number] {
    return [0, this.error.length - 1];
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
      { label: 'error', value: formatQuantity(this.error[item], 'LSB', { decimals: 4 }) },
    ];
  }

  summary(): string {
    const { error, worst } = this;
    let beyond = 0;
    // A rounded tie stands on the line itself; the slack keeps it inside.
    for (const each of error) if (Math.abs(each) > 0.5 + 1e-9) beyond += 1;
    const others = beyond === 0 ? 'No entry is' : beyond === 1 ? 'One entry is' : `${beyond} entries are`;
    return (
      `Error of ${error.length} entries in LSB. The largest is ${formatQuantity(error[worst], 'LSB', { decimals: 4 })}, ` +
      `at entry ${worst}. ${others} off by more than half an LSB.`
    );
  }

  csv(): string {
    const rows = ['entry,error_lsb'];
    for (let k = 0; k < this.error.length; k += 1) rows.push(`${k},${this.error[k]}`);
    return `${rows.join('\n')}\n`;
  }

  private level(pen: Pen, area: PlotArea, y: number, color: string, dash?: readonly number[]) {
    pen.begin();
    pen.move(area.left, y);
    pen.line(area.right, y);
    pen.stroke(color, area.unit, dash);
  }

  private sayExact(pen: Pen, area: PlotArea, theme: PlotTheme) {
    pen.text('no error: every code is exact', area.left + area.width / 2, area.y(0) - 9 * area.unit, {
      color: theme.brick,
      align: 'center',
      halo: theme.paper,
    });
  }
}
