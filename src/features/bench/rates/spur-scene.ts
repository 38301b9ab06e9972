import { formatQuantity } from '../../../../shared/quantities/index.ts';
import {
  decimalTicks,
  tickText,
  type AxisSpec,
  type Pen,
  type PlotArea,
  type PlotTheme,
  type ReadOut,
  type Scene,
} from '../../../plots/index.ts';
import type { AccumulatorAnswer } from '../../../workers/figures-messages.ts';

export interface SpurData extends AccumulatorAnswer {
  readonly sampleRateHz: number;
  readonly tableLength: number;
}

/** Room above the carrier, and the least and the most that is shown below it, in dB. */
const topDb = 6;
const leastDepth = 60;
const mostDepth = 160;

/** Lines of a phase accumulator's output, over 0…fs/2 and against the carrier. */
export class SpurScene implements Scene<SpurData> {
  readonly leastSpan: number;
  readonly axes: readonly AxisSpec[];
  private data: SpurData;
  private frequencies = new Float64Array(0);
  private levels = new Float64Array(0);

  constructor(data: SpurData) {
    this.data = data;
    this.set(data);
    this.leastSpan = data.sampleRateHz / 1e6;
    this.axes = [
      {
        side: 'left',
        title: 'level in dBc',
        ticks: (min, max, px) => decimalTicks(min, max, Math.min(6, px / 28)),
        text: tickText,
        hasGrid: true,
      },
      {
        side: 'bottom',
        title: 'f in kHz',
        ticks: (min, max, px) => decimalTicks(min, max, Math.min(5, px / 90)),
        text: (hz) => tickText(Number((hz / 1_000).toPrecision(6))),
      },
    ];
  }

  set(data: SpurData): void {
    this.data = data;
    const { lines, figures, sampleRateHz } = data;
    const carrier = figures.carrierAmplitude || 1;
    this.frequencies = lines.bins.map((bin) => (bin * sampleRateHz) / lines.period);
    this.levels = lines.amplitudes.map((amplitude) => 20 * Math.log10(amplitude / carrier));
  }

  extent(): readonly [number, number] {
    return [0, this.data.sampleRateHz / 2];
  }

  yRange(): readonly [number, number] {
    let lowest = 0;
    for (const level of this.levels) if (level > -mostDepth && level < lowest) lowest = level;
    const depth = Math.min(mostDepth, Math.max(leastDepth, -lowest + 10));
    return [-Math.ceil(depth / 20) * 20, topDb];
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    // The table's own lines first: what truncating adds must not be hidden below them.
    this.stems(pen, area, theme.water, false);
    this.stems(pen, area, theme.brick, true);
  }

  private stems(pen: Pen, area: PlotArea, color: string, ofTruncation: boolean): void {
    const { unit } = area;
    const hasHeads = this.levels.length < 160;
    pen.begin();
    this.each(area, ofTruncation, (x, y) => {
      pen.move(x, area.bottom);
      pen.line(x, y);
    });
    pen.stroke(color, 1.4 * unit, ofTruncation ? [3 * unit, 2 * unit] : undefined);
    if (!hasHeads) return;
    this.each(area, ofTruncation, (x, y) => {
      if (ofTruncation) pen.rect(x - 2.5 * unit, y - 2.5 * unit, 5 * unit, 5 * unit, color);
      else pen.disc(x, y, 3 * unit, color);
    });
  }

  private each(area: PlotArea, ofTruncation: boolean, draw: (x: number, y: number) => void): void {
    for (let i = 0; i < this.frequencies.length; i += 1) {
      if (this.isOfTruncation(i) !== ofTruncation) continue;
      const hz = this.frequencies[i];
      if (hz < area.from || hz > area.to || this.levels[i] < area.low) continue;
      draw(area.x(hz), area.y(this.levels[i]));
    }
  }

  private isOfTruncation(item: number): boolean {
    const { lines, tableLength, figures } = this.data;
    return figures.period > tableLength && 2 * lines.tableLines[item] >= tableLength;
  }

  items(): readonly [number, number] {
    return [0, Math.max(0, this.frequencies.length - 1)];
  }

  itemAt(x: number): number {
    let low = 0;
    let high = this.frequencies.length - 1;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (this.frequencies[middle] < x) low = middle + 1;
      else high = middle;
    }
    const isNearerBefore = low > 0 && x - this.frequencies[low - 1] < this.frequencies[low] - x;
    return Math.max(0, isNearerBefore ? low - 1 : low);
  }

  spanOf(item: number): readonly [number, number] {
    const half = this.data.sampleRateHz / 800;
    const hz = this.frequencies[item] ?? 0;
    return [hz - half, hz + half];
  }

  marksAt(item: number): readonly { x: number; y: number }[] {
    const y = this.levels[item];
    return y === undefined ? [] : [{ x: this.frequencies[item], y }];
  }

  readOut(item: number): readonly ReadOut[] {
    if (item >= this.frequencies.length) return [];
    return [
      { label: 'frequency', value: formatQuantity(this.frequencies[item], 'Hz', { significant: 7 }) },
      { label: 'level', value: formatQuantity(this.levels[item], 'dBc', { decimals: 1 }) },
      { label: 'is', value: this.kindOf(item) },
    ];
  }

  private kindOf(item: number): string {
    const { lines, figures } = this.data;
    if (lines.bins[item] === figures.carrierBin) return 'the carrier';
    return this.isOfTruncation(item)
      ? 'added by cutting the phase short'
      : `line ${lines.tableLines[item]} of the table`;
  }

  summary(): string {
    const { figures, sampleRateHz, lines } = this.data;
    const { carrierBin, worstOtherBin, worstOtherDbc, worstTruncationDbc, period } = figures;
    if (carrierBin === null) return 'The output holds no line but DC.';
    const hz = (bin: number) => formatQuantity((bin * sampleRateHz) / period, 'Hz', { significant: 5 });
    const db = (level: number) => formatQuantity(level, 'dBc', { decimals: 1 });
    const worst =
      worstOtherDbc === null || worstOtherBin === null
        ? 'There is no other line.'
        : `The strongest other line is ${db(worstOtherDbc)} at ${hz(worstOtherBin)}.`;
    const cut =
      worstTruncationDbc === null
        ? 'Cutting the phase short adds none.'
        : `The strongest that cutting the phase short adds is ${db(worstTruncationDbc)}.`;
    return `${lines.bins.length} lines. The carrier is at ${hz(carrierBin)}. ${worst} ${cut}`;
  }

  csv(): string {
    const { lines } = this.data;
    const rows = ['frequency_hz,level_dbc,amplitude,table_line,is'];
    for (let i = 0; i < this.frequencies.length; i += 1) {
      rows.push(
        `${this.frequencies[i]},${this.levels[i]},${lines.amplitudes[i]},${lines.tableLines[i]},${this.kindOf(i)}`,
      );
    }
    return `${rows.join('\n')}\n`;
  }
}
