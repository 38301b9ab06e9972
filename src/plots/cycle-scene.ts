import { formatQuantity } from '../../shared/quantities/index.ts';
import { LabelRoom } from './label-place.ts';
import { wordsPx, type Pen } from './pen.ts';
import type { PlotArea } from './plot-area.ts';
import type { PlotTheme } from './plot-theme.ts';
import type { AxisSpec, ReadOut, Scene } from './scene.ts';
import { binaryTicks, decimalTicks, tickText, wholeTicks } from './ticks.ts';
import { isDense, traceLine, traceStairs } from './traces.ts';

export interface CycleData {
  /** The levelled cycle, one value an entry. */
  cycle: Float64Array;
  /** What the codes stand for, in the units of `cycle`. */
  values: Float64Array;
  /** 0…2^bits − 1. */
  codes: Uint16Array;
  bits: number;
  range: 'bipolar' | 'unipolar';
  /** One LSB in the units of `cycle`. */
  lsb: number;
  errorLsb: Float64Array;
  sampleAt: 'start' | 'centre';
  /** Periods of the wave in the table. Places points. */
  cycles: number;
  /** Where the table starts in the cycle, in degrees. Places points. */
  startPhaseDeg: number;
  /** Pin voltage of a code, shown in the read-out. */
  voltsOf?: (code: number) => number;
}

/** Room above and below the whole range, as a share of it. */
const margin = 0.07;
/** An entry needs this much width to show where it was sampled, and this much to carry its code. */
const dotWidth = 18;
const codeWidth = 44;
/** Room above and below what is in sight, as a share of its range: codes stand there. */
const codeRoom = 0.2;
/** CSS pixels that an axis' title needs before the end of the axis. */
const titleRoom = 16;

/** One table: the ideal line, and the treads of the codes as masonry standing on code 0. */
export class CycleScene implements Scene<CycleData> {
  readonly leastSpan = 4;
  readonly axes: readonly AxisSpec[];
  private data: CycleData;
  private readonly room = new LabelRoom();

  constructor(data: CycleData) {
    this.data = data;
    this.axes = [
      {
        side: 'left',
        title: 'signal, full scale = 1',
        ticks: (min, max, px) => decimalTicks(min, max, px / 36),
        text: tickText,
        hasGrid: true,
      },
      {
        side: 'right',
        title: 'code',
        ticks: (min, max, px) => this.codeTicks(min, max, px),
        text: (y) => String(this.codeAt(y)),
      },
      {
        side: 'bottom',
        title: 'entry',
        ticks: (min, max, px) => entryTicks(this.length, min, max, px),
        text: tickText,
      },
    ];
  }

  set(data: CycleData): void {
    this.data = data;
  }

  extent(): readonly [number, number] {
    return [0, this.length];
  }

  yRange(from: number, to: number): readonly [number, number] {
    const { range, lsb, cycle, values } = this.data;
    const [bottom, top] = range === 'bipolar' ? [-1, 1] : [0, 1];
    if (to - from >= this.length) {
      const room = (top - bottom) * margin;
      return [bottom - room, top + room];
    }
    let low = Infinity;
    let high = -Infinity;
    for (let k = Math.max(0, Math.floor(from)); k < Math.min(this.length, Math.ceil(to)); k += 1) {
      low = Math.min(low, cycle[k], values[k]);
      high = Math.max(high, cycle[k], values[k]);
    }
    const room = Math.max((high - low) * codeRoom, 1.5 * lsb);
    return [low - room, high + room];
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { cycle, values } = this.data;
    const { unit } = area;
    const { offset } = this;
    const entryWidth = area.width / (area.to - area.from) / unit;
    const stairWidth = Math.max(1, Math.round(1.6 * unit));
    const crisp = isDense(area) || stairWidth % 2 === 0 ? 0 : 0.5;

    traceStairs(pen, area, values, 0, area.bottom);
    pen.fill(theme.brickWash);
    traceLine(pen, area, cycle, offset);
    pen.stroke(theme.water, 2.4 * unit);
    traceStairs(pen, area, values, crisp);
    pen.stroke(theme.brick, stairWidth);

    if (entryWidth >= dotWidth) this.drawSamples(pen, area, theme, offset);
    if (entryWidth >= codeWidth) this.drawCodes(pen, area, theme);
    else this.drawLabels(pen, area, theme, offset);
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
    const { cycle, values } = this.data;
    return [
      { x: item + this.offset, y: cycle[item] },
      { x: item + 0.5, y: values[item] },
    ];
  }

  readOut(item: number): readonly ReadOut[] {
    const { codes, values, errorLsb, voltsOf } = this.data;
    const code = codes[item];
    const said = [
      { label: 'entry', value: String(item) },
      { label: 'code', value: String(code) },
      { label: 'value', value: formatQuantity(values[item], '', { decimals: 5 }) },
    ];
    if (voltsOf) said.push({ label: 'pin', value: formatQuantity(voltsOf(code), 'V') });
    said.push({ label: 'error', value: formatQuantity(errorLsb[item], 'LSB', { decimals: 3 }) });
    return said;
  }

  summary(): string {
    const { codes, bits, errorLsb } = this.data;
    let low = codes[0];
    let high = codes[0];
    let worst = 0;
    for (let k = 0; k < codes.length; k += 1) {
      if (codes[k] < low) low = codes[k];
      if (codes[k] > high) high = codes[k];
      if (Math.abs(errorLsb[k]) > Math.abs(errorLsb[worst])) worst = k;
    }
    return (
      `A table of ${codes.length} entries at ${bits} bits, of ${2 ** bits} codes. The codes run from ${low} to ${high}. ` +
      `The largest error is ${formatQuantity(errorLsb[worst], 'LSB', { decimals: 3 })}, at entry ${worst}.`
    );
  }

  csv(): string {
    const { cycle, values, codes, errorLsb } = this.data;
    const rows = ['entry,ideal,value,code,error_lsb'];
    for (let k = 0; k < codes.length; k += 1)
      rows.push(`${k},${cycle[k]},${values[k]},${codes[k]},${errorLsb[k]}`);
    return `${rows.join('\n')}\n`;
  }

  private get length(): number {
    return this.data.codes.length;
  }

  /** Where in its entry a sample is taken, δ. */
  private get offset(): number {
    return this.data.sampleAt === 'centre' ? 0.5 : 0;
  }

  private get floorValue(): number {
    return this.data.range === 'bipolar' ? -1 : 0;
  }

  private codeAt(y: number): number {
    return Math.round((y - this.floorValue) / this.data.lsb);
  }

  private codeTicks(min: number, max: number, px: number): number[] {
    const { bits, lsb } = this.data;
    const top = 2 ** bits - 1;
    const lowest = Math.max(0, (min - this.floorValue) / lsb);
    const highest = Math.min(top, (max - this.floorValue) / lsb);
    const target = px / 36;
    const codes = binaryTicks(lowest, highest, target);
    // The top code is no power of two; it takes its own tick where it does not crowd the one below.
    const room = ((highest - lowest) / Math.max(1, target)) * 0.45;
    if (highest === top && codes.length > 0 && top - codes[codes.length - 1] >= room) codes.push(top);
    return codes.map((code) => this.floorValue + code * lsb);
  }

  private drawSamples(pen: Pen, area: PlotArea, theme: PlotTheme, offset: number) {
    const { cycle } = this.data;
    const last = Math.min(this.length - 1, Math.ceil(area.to));
    for (let k = Math.max(0, Math.floor(area.from) - 1); k <= last; k += 1) {
      pen.disc(area.x(k + offset), area.y(cycle[k]), 3.2 * area.unit, theme.water);
    }
  }

  private drawCodes(pen: Pen, area: PlotArea, theme: PlotTheme) {
    const { codes, values, cycle } = this.data;
    const last = Math.min(this.length, Math.ceil(area.to));
    const style = { color: theme.brick, face: 'figures', align: 'center' } as const;
    for (let k = Math.max(0, Math.floor(area.from)); k < last; k += 1) {
      // On the side of the tread that the ideal line is not on.
      const ideal = (cycle[k] + cycle[(k + 1) % this.length]) / 2;
      const isAbove = ideal < values[k];
      const y = area.y(values[k]) + (isAbove ? -1 : 1) * wordsPx * area.unit;
      pen.text(String(codes[k]), area.x(k + 0.5), y, {
        ...style,
        halo: isAbove ? theme.paper : theme.brickWash,
      });
    }
  }

  /** Says which line is which, right beside each. */
  private drawLabels(pen: Pen, area: PlotArea, theme: PlotTheme, offset: number) {
    const { unit } = area;
    this.room.measure(area, this.data.cycle, offset);
    const labels = [
      { words: 'ideal', side: 'above', color: theme.water, halo: theme.paper, width: 36 },
      { words: 'quantised', side: 'below', color: theme.brick, halo: theme.brickWash, width: 64 },
    ] as const;
    labels.forEach(({ words, side, color, halo, width }, index) => {
      const spot = this.room.find(area, words, side, width * unit, wordsPx * unit, 9 * unit);
      const style = { color, halo, weight: 650 };
      if (spot) pen.text(words, spot.x, spot.y, style);
      else
        pen.text(words, area.left + (10 + index * 52) * unit, area.top + 12 * unit, {
          ...style,
          halo: theme.paper,
        });
    });
  }
}

/** Entries in powers of two where the table's length is one. The end is left free for the axis' title. */
export function entryTicks(length: number, min: number, max: number, px: number): number[] {
  const target = px / 64;
  const end = max - ((max - min) / px) * titleRoom;
  return Number.isInteger(Math.log2(length)) ? binaryTicks(min, end, target) : wholeTicks(min, end, target);
}
