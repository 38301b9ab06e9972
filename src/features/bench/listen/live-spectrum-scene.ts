import { formatQuantity } from '../../../../shared/quantities/index.ts';
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
} from '../../../plots/index.ts';
import type { HeardSpectrum } from './readings.ts';
import type { Predicted } from './use-predicted.ts';

export interface LiveSpectrumData {
  /** Null while nothing sounds. */
  readonly heard: HeardSpectrum | null;
  readonly predicted: Predicted;
}

const lowestDb = -120;
const topDb = 4;
const lowestHz = 20;
/** Half-width of the window's main lobe, in bins. */
const lobe = 3;
/** Equivalent noise bandwidth of the Blackman window in bins: Σw²·N/(Σw)² = 0.3046/0.42² (F. J. Harris 1978, table I). */
const noiseBins = (0.42 ** 2 + 0.5 ** 2 / 2 + 0.08 ** 2 / 2) / 0.42 ** 2;
const saidLines = 5;
const ringPx = 3.5;
/** More rings than these would hide each other; weaker lines are stems alone. */
const mostRings = 24;

const dbOf = (amplitude: number) => 20 * Math.log10(amplitude);
const dbfs = (level: number) => formatQuantity(level, 'dBFS', { decimals: 1 });
const hertz = (hz: number) => formatQuantity(hz, 'Hz', { significant: 4 });

/**
 * Level of the sine at a frequency: the power within the window's main lobe, which does not depend on where the sine
 * lies between two bins. Sines closer than 7 bins run together.
 *
 * @returns dBFS; −Infinity where nothing is heard
 */
export function heardLevelDb({ levelsDb, binHz }: HeardSpectrum, hz: number): number {
  const middle = Math.round(hz / binHz);
  let power = 0;
  for (let k = Math.max(0, middle - lobe); k <= middle + lobe && k < levelsDb.length; k += 1)
    power += 10 ** (levelsDb[k] / 10);
  return 10 * Math.log10(power / noiseBins);
}

/** Rings on stems for what was predicted, and over them the outline of what is heard. */
export class LiveSpectrumScene implements Scene<LiveSpectrumData> {
  readonly leastSpan = 0.02;
  readonly axes: readonly AxisSpec[];
  private data: LiveSpectrumData;
  private isLog: boolean;
  /** The strongest predicted lines, strongest first, and of which lines they are. */
  private ringed: Predicted['lines'] = [];
  private rankedOf: Predicted['lines'] | undefined;

  constructor(data: LiveSpectrumData, isLog: boolean) {
    this.data = data;
    this.isLog = isLog;
    this.set(data);
    this.axes = [
      {
        side: 'left',
        title: 'level in dBFS',
        ticks: (min, max, px) => decimalTicks(min, max, Math.min(4, px / 30)),
        text: tickText,
      },
      {
        side: 'bottom',
        title: 'f in kHz',
        ticks: (min, max, px) =>
          this.isLog ? logTicks(min, max, px / 60) : decimalTicks(min, max, Math.min(6, px / 60)),
        text: (x) => tickText(Number((this.hzAt(x) / 1_000).toPrecision(4))),
      },
    ];
  }

  set(data: LiveSpectrumData): void {
    this.data = data;
    const { lines } = data.predicted;
    if (lines === this.rankedOf) return;
    this.rankedOf = lines;
    this.ringed = [...lines].sort((a, b) => b.amplitude - a.amplitude).slice(0, mostRings);
  }

  /** Goes over to the other scale of frequency. */
  show(isLog: boolean): void {
    this.isLog = isLog;
  }

  extent(): readonly [number, number] {
    const { limitHz } = this.data.predicted;
    return this.isLog ? [Math.log10(lowestHz), Math.log10(limitHz)] : [0, limitHz];
  }

  yRange(): readonly [number, number] {
    return [lowestDb, topDb];
  }

  private hzAt(x: number): number {
    return this.isLog ? 10 ** x : x;
  }

  private placeOf(hz: number): number {
    return this.isLog ? Math.log10(Math.max(hz, 1e-3)) : hz;
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    this.drawPredicted(pen, area, theme);
    if (this.data.heard !== null) this.drawHeard(pen, area, theme, this.data.heard);
    this.drawNames(pen, area, theme);
  }

  private drawPredicted(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { unit } = area;
    pen.begin();
    for (const { hz, amplitude } of this.data.predicted.lines) {
      const x = area.x(this.placeOf(hz));
      const y = area.y(dbOf(amplitude));
      if (x < area.left || x > area.right || !(y < area.bottom)) continue;
      pen.move(x, area.bottom);
      pen.line(x, y);
    }
    pen.stroke(theme.water, 1.2 * unit);
    for (const { hz, amplitude } of this.ringed) {
      const x = area.x(this.placeOf(hz));
      const y = area.y(dbOf(amplitude));
      if (x < area.left || x > area.right || !(y < area.bottom)) continue;
      pen.disc(x, y, ringPx * unit, theme.water);
      pen.disc(x, y, (ringPx - 1.4) * unit, theme.paper);
    }
  }

  /** The strongest bin of each column of pixels; where columns are finer than bins, the bins themselves. */
  private drawHeard(pen: Pen, area: PlotArea, theme: PlotTheme, { levelsDb, binHz }: HeardSpectrum): void {
    const { unit } = area;
    const last = levelsDb.length - 1;
    const perUnit = (area.to - area.from) / area.width;
    let bin = Math.max(1, Math.floor(this.hzAt(area.from) / binHz));
    let isBegun = false;
    pen.begin();
    for (let px = 0; px < area.width && bin <= last; px += unit) {
      const end = Math.min(last, Math.floor(this.hzAt(area.from + (px + unit) * perUnit) / binHz));
      if (end < bin) continue;
      let level = levelsDb[bin];
      for (let k = bin + 1; k <= end; k += 1) if (levelsDb[k] > level) level = levelsDb[k];
      bin = end + 1;
      const y = area.y(Math.max(lowestDb - 20, level));
      if (isBegun) pen.line(area.left + px, y);
      else pen.move(area.left + px, y);
      isBegun = true;
    }
    pen.stroke(theme.brick, 1.4 * unit);
  }

  /** Which is which, in the corner where there is room: lines lie lower the higher their frequency. */
  private drawNames(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { unit, top, right } = area;
    const { lines } = this.data.predicted;
    const style = { color: theme.ink, align: 'right', halo: theme.paper } as const;
    let y = top + 10 * unit;
    if (lines.length > 0) {
      pen.disc(right - 76 * unit, y, ringPx * unit, theme.water);
      pen.disc(right - 76 * unit, y, (ringPx - 1.4) * unit, theme.paper);
      pen.text('predicted', right - 6 * unit, y, style);
      y += 17 * unit;
    }
    if (this.data.heard === null) return;
    pen.begin();
    pen.move(right - 60 * unit, y);
    pen.line(right - 46 * unit, y);
    pen.stroke(theme.brick, 2 * unit);
    pen.text('heard', right - 6 * unit, y, style);
  }

  items(): readonly [number, number] {
    return [0, Math.max(0, this.data.predicted.lines.length - 1)];
  }

  itemAt(x: number): number {
    const { lines } = this.data.predicted;
    const hz = this.hzAt(x);
    let nearest = 0;
    for (let i = 1; i < lines.length; i += 1)
      if (Math.abs(lines[i].hz - hz) < Math.abs(lines[nearest].hz - hz)) nearest = i;
    return nearest;
  }

  spanOf(item: number): readonly [number, number] {
    const line = this.data.predicted.lines[item] as (typeof this.data.predicted.lines)[number] | undefined;
    const place = this.placeOf(line?.hz ?? lowestHz);
    const [from, to] = this.extent();
    const half = (to - from) / 400;
    return [place - half, place + half];
  }

  marksAt(): readonly { x: number; y: number }[] {
    return [];
  }

  readOut(item: number): readonly ReadOut[] {
    const { predicted, heard } = this.data;
    if (item >= predicted.lines.length) return [];
    const { hz, amplitude } = predicted.lines[item];
    const said = [
      { label: 'at', value: formatQuantity(hz, 'Hz', { significant: 5 }) },
      { label: 'predicted', value: dbfs(dbOf(amplitude)) },
    ];
    if (heard !== null) said.push({ label: 'heard', value: sayHeard(heardLevelDb(heard, hz)) });
    return said;
  }

  summary(): string {
    const { predicted, heard } = this.data;
    const { lines, limitHz, whyNone } = predicted;
    const said = this.ringed
      .slice(0, saidLines)
      .map(
        ({ hz, amplitude }) =>
          `${hertz(hz)} ${dbfs(dbOf(amplitude))}${heard === null ? '' : `, heard at ${sayHeard(heardLevelDb(heard, hz))}`}`,
      );
    const range = `Spectrum up to ${hertz(limitHz)}, ${heard === null ? 'nothing sounds' : 'as it sounds'}. `;
    if (whyNone !== null) return range + whyNone;
    if (said.length === 0) return `${range}No line is predicted.`;
    return `${range}${lines.length} predicted ${lines.length === 1 ? 'line' : 'lines'}, the strongest: ${said.join('; ')}.`;
  }

  csv(): string {
    const { predicted, heard } = this.data;
    const rows = ['kind,frequency_hz,level_dbfs'];
    for (const { hz, amplitude } of predicted.lines) rows.push(`predicted,${hz},${dbOf(amplitude)}`);
    if (heard !== null) heard.levelsDb.forEach((level, k) => rows.push(`heard,${k * heard.binHz},${level}`));
    return `${rows.join('\n')}\n`;
  }
}

function sayHeard(level: number): string {
  return level > -140 ? dbfs(level) : 'nothing';
}
