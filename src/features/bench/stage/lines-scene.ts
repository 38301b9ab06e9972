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
import type { StageLines } from '../../../workers/stage-messages.ts';

export interface LinesData {
  readonly lines: StageLines;
  readonly sampleRateHz: number;
  readonly tableLength: number;
}

/** Room above 0 dBFS for the names. */
const topDb = 50;
const titleRoom = 60;
const bottomDb = -120;
const shownRates = 3;
/** Places at which the curve of the hold is laid. */
const curvePoints = 360;

/** Lines of the output up to three times the sample rate, with the hold that shapes them and the images it leaves. */
export class LinesScene implements Scene<LinesData> {
  readonly leastSpan: number;
  readonly axes: readonly AxisSpec[];
  private data: LinesData;
  /** Level of the strongest line with the hold taken out of it. */
  private carrierDb = 0;

  constructor(data: LinesData) {
    this.data = data;
    this.set(data);
    this.leastSpan = data.sampleRateHz / 1e5;
    this.axes = [
      {
        side: 'left',
        title: 'level in dBFS',
        ticks: (min, max, px) => decimalTicks(min, Math.min(0, max), Math.min(6, px / 28)),
        text: tickText,
        hasGrid: true,
      },
      {
        side: 'bottom',
        title: 'f in kHz',
        ticks: (min, max, px) =>
          decimalTicks(min, max - ((max - min) / px) * titleRoom, Math.min(5, px / 64)),
        text: (hz) => tickText(Number((hz / 1_000).toPrecision(6))),
      },
    ];
  }

  set(data: LinesData): void {
    this.data = data;
    const { lines } = data;
    let strongest = -1;
    for (let i = 0; i < lines.heldDb.length; i += 1)
      if (!this.isImage(i) && (strongest < 0 || lines.heldDb[i] > lines.heldDb[strongest])) strongest = i;
    this.carrierDb =
      strongest < 0
        ? 0
        : lines.heldDb[strongest] - holdDb(lines.frequenciesHz[strongest] / data.sampleRateHz);
  }

  private isImage(item: number): boolean {
    return 2 * this.data.lines.multiples[item] > this.data.tableLength;
  }

  extent(): readonly [number, number] {
    return [0, shownRates * this.data.sampleRateHz];
  }

  yRange(): readonly [number, number] {
    return [bottomDb, topDb];
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { unit } = area;
    const { lines, sampleRateHz } = this.data;
    this.curve(pen, area, (hz) => this.carrierDb + holdDb(hz / sampleRateHz));
    pen.stroke(theme.inkSoft, unit, [2 * unit, 3 * unit]);
    for (const ofImages of [false, true]) {
      const color = ofImages ? theme.brick : theme.water;
      pen.begin();
      this.each(area, ofImages, lines.outputDb, (x, y) => {
        pen.move(x, area.bottom);
        pen.line(x, y);
      });
      pen.stroke(color, 1.4 * unit, ofImages ? [3 * unit, 2 * unit] : undefined);
      if (lines.multiples.length > 400) continue;
      this.each(area, ofImages, lines.outputDb, (x, y) => {
        if (ofImages) pen.rect(x - 2.5 * unit, y - 2.5 * unit, 5 * unit, 5 * unit, color);
        else pen.disc(x, y, 3 * unit, color);
      });
    }
    this.names(pen, area, theme);
  }

  private curve(pen: Pen, area: PlotArea, levelAt: (hz: number) => number): void {
    pen.begin();
    for (let i = 0; i <= curvePoints; i += 1) {
      const hz = area.from + ((area.to - area.from) * i) / curvePoints;
      const y = area.y(Math.max(bottomDb, levelAt(hz)));
      if (i === 0) pen.move(area.x(hz), y);
      else pen.line(area.x(hz), y);
    }
  }

  private each(
    area: PlotArea,
    ofImages: boolean,
    levels: Float64Array,
    draw: (x: number, y: number) => void,
  ): void {
    const { frequenciesHz } = this.data.lines;
    for (let i = 0; i < levels.length; i += 1) {
      const hz = frequenciesHz[i];
      if (this.isImage(i) !== ofImages || hz < area.from || hz > area.to || levels[i] < area.low) continue;
      draw(area.x(hz), area.y(levels[i]));
    }
  }

  private names(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { unit } = area;
    const words = [
      ['● lines of the wave', theme.water],
      ['■ images', theme.brick],
      ['┄ hold of each sample', theme.inkSoft],
    ] as const;
    words.forEach(([text, color], index) => {
      const y = area.top + (10 + 17 * index) * unit;
      pen.text(text, area.right - 4 * unit, y, { color, align: 'right', weight: 650, halo: theme.paper });
    });
  }

  items(): readonly [number, number] {
    return [0, Math.max(0, this.data.lines.multiples.length - 1)];
  }

  itemAt(x: number): number {
    const { frequenciesHz } = this.data.lines;
    let low = 0;
    let high = frequenciesHz.length - 1;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (frequenciesHz[middle] < x) low = middle + 1;
      else high = middle;
    }
    const isNearerBefore = low > 0 && x - frequenciesHz[low - 1] < frequenciesHz[low] - x;
    return Math.max(0, isNearerBefore ? low - 1 : low);
  }

  spanOf(item: number): readonly [number, number] {
    const half = this.data.sampleRateHz / 400;
    const hz = this.data.lines.frequenciesHz[item] ?? 0;
    return [hz - half, hz + half];
  }

  marksAt(item: number): readonly { x: number; y: number }[] {
    const { frequenciesHz, outputDb } = this.data.lines;
    return item < outputDb.length ? [{ x: frequenciesHz[item], y: outputDb[item] }] : [];
  }

  readOut(item: number): readonly ReadOut[] {
    const { frequenciesHz, heldDb, outputDb } = this.data.lines;
    if (item >= outputDb.length) return [];
    const level = (db: number) => formatQuantity(db, 'dBFS', { decimals: 1 });
    return [
      { label: this.isImage(item) ? 'image at' : 'line at', value: hertz(frequenciesHz[item]) },
      { label: 'at the pin', value: level(heldDb[item]) },
      { label: 'at the output', value: level(outputDb[item]) },
    ];
  }

  summary(): string {
    const { lines, sampleRateHz } = this.data;
    const best = (ofImages: boolean) => {
      let found = -1;
      for (let i = 0; i < lines.outputDb.length; i += 1)
        if (this.isImage(i) === ofImages && (found < 0 || lines.outputDb[i] > lines.outputDb[found]))
          found = i;
      return found < 0
        ? 'none'
        : `${hertz(lines.frequenciesHz[found])} at ${formatQuantity(lines.outputDb[found], 'dBFS', { decimals: 1 })}`;
    };
    return (
      `Spectrum at the output up to ${hertz(shownRates * sampleRateHz)}, 0 dBFS being a sine from rail to rail. ` +
      `Strongest line of the wave: ${best(false)}. Strongest image: ${best(true)}.`
    );
  }

  csv(): string {
    const { multiples, frequenciesHz, heldDb, outputDb } = this.data.lines;
    const rows = ['multiple,frequency_hz,level_pin_dbfs,level_output_dbfs,is'];
    multiples.forEach((multiple, i) =>
      rows.push(
        `${multiple},${frequenciesHz[i]},${heldDb[i]},${outputDb[i]},${this.isImage(i) ? 'image' : 'line'}`,
      ),
    );
    return `${rows.join('\n')}\n`;
  }
}

/** `20·log10 |sin(πx)/(πx)|`. */
function holdDb(x: number): number {
  const angle = Math.PI * x;
  return angle === 0 ? 0 : 20 * Math.log10(Math.max(1e-12, Math.abs(Math.sin(angle) / angle)));
}

const hertz = (hz: number) => formatQuantity(hz, 'Hz', { significant: 5 });
