import { formatQuantity } from '../../shared/quantities/index.ts';
import { wordsPx, type Pen } from './pen.ts';
import type { PlotArea } from './plot-area.ts';
import type { PlotTheme } from './plot-theme.ts';
import type { AxisSpec, ReadOut, Scene } from './scene.ts';
import { StemRoom } from './stem-room.ts';
import { drawColumns, drawHeads, drawStems, layHead, type StemStyle } from './stems.ts';
import { decimalTicks, logTicks, tickText, wholeTicks } from './ticks.ts';

export interface SpectrumData {
  /** `A_k` of what the codes stand for, bins 0…⌊N/2⌋. */
  amplitudes: Float64Array;
  /** `A_k` of the levelled cycle. */
  intended: Float64Array;
  /** `A_k` of the error. */
  added: Float64Array;
  /** N, in entries. */
  tableLength: number;
  /** K, periods of the wave in the table. */
  cycles: number;
  /** Where given, a second axis shows Hz: bin k lies at k·sampleRateHz/tableLength. */
  sampleRateHz?: number | undefined;
}

export interface SpectrumScale {
  level: 'db' | 'linear';
  frequency: 'linear' | 'log';
}

/** Lowest level shown; the lower one where all that quantising added would lie under the first. In dBFS. */
const usualFloorDb = -120;
const deepFloorDb = -160;
/** Room above full scale. */
const topDb = 8;
/** CSS pixels that the title of the harmonics needs before the end of its axis. */
const titleRoom = 28;
/** Width of a letter of a label, and of the head before it with the gap after that, in CSS pixels. */
const letterPx = 7;
const keyPx = 14;
/** Lowest level written down, where a line has no amplitude at all (engine specification §4). */
const leastDb = -200;

export function levelDb(amplitude: number): number {
  return amplitude <= 0 ? leastDb : Math.max(leastDb, 20 * Math.log10(amplitude));
}

/** Lines of the table's loop: round heads for what was intended, diamonds for what quantising added. */
export class SpectrumScene implements Scene<SpectrumData> {
  readonly leastSpan = 0.25;
  readonly axes: readonly AxisSpec[];
  private data: SpectrumData;
  private shown: SpectrumScale;
  private strongestAdded = 1;
  private top = 1;
  private floorDb = usualFloorDb;
  private readonly room = new StemRoom();

  constructor(data: SpectrumData, shown: SpectrumScale) {
    this.data = data;
    this.shown = shown;
    this.set(data);
    this.axes = [
      this.levelAxis(),
      this.harmonicAxis(),
      ...(data.sampleRateHz === undefined ? [] : [this.hertzAxis()]),
    ];
  }

  set(data: SpectrumData): void {
    this.data = data;
    this.strongestAdded = strongest(data.added);
    const addedDb = levelDb(data.added[this.strongestAdded]);
    this.floorDb = addedDb < usualFloorDb + 10 && addedDb > deepFloorDb ? deepFloorDb : usualFloorDb;
    this.top = Math.max(
      0.01,
      data.amplitudes[0],
      data.intended[strongest(data.intended)],
      data.added[this.strongestAdded],
    );
  }

  /** Goes over to other scales. */
  show(shown: SpectrumScale): void {
    this.shown = shown;
  }

  extent(): readonly [number, number] {
    const last = this.data.added.length - 1;
    if (this.shown.frequency === 'linear') return [-0.5, last + 0.5];
    return [Math.log10(0.8), Math.log10(last * 1.15)];
  }

  yRange(): readonly [number, number] {
    return this.shown.level === 'db' ? [this.floorDb, topDb] : [0, this.top * 1.14];
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { intended, added } = this.data;
    const { unit } = area;
    const addedStyle: StemStyle = {
      color: theme.brick,
      width: unit,
      head: 'diamond',
      radius: 3.4 * unit,
    };
    const intendedStyle: StemStyle = {
      color: theme.water,
      width: this.stemWidth(area),
      head: 'disc',
      radius: 4 * unit,
    };
    const firstDense = this.firstDense(area);
    const first = this.firstShown(area);
    drawColumns(pen, area, this, added, firstDense, addedStyle);
    drawColumns(pen, area, this, intended, firstDense, intendedStyle);
    // The wide stem covers the thin one that shares its place; heads lie over all stems, diamonds over discs.
    drawStems(pen, area, this, added, first, firstDense, addedStyle);
    drawStems(pen, area, this, intended, first, firstDense, intendedStyle);
    drawHeads(pen, area, this, intended, first, firstDense, intendedStyle);
    drawHeads(pen, area, this, added, first, firstDense, addedStyle);
    this.labels(pen, area, theme, { intended: intendedStyle, added: addedStyle });
  }

  /** Height of an amplitude on the scale that is shown. */
  heightOf(amplitude: number): number {
    return this.shown.level === 'db' ? levelDb(amplitude) : amplitude;
  }

  /** Place of a bin on x. */
  placeOf(bin: number): number {
    return this.shown.frequency === 'log' ? Math.log10(bin) : bin;
  }

  /** Bin, with fractions, at a place on x. */
  binAt(x: number): number {
    return this.shown.frequency === 'log' ? 10 ** x : x;
  }

  items(): readonly [number, number] {
    return [this.shown.frequency === 'log' ? 1 : 0, this.data.added.length - 1];
  }

  itemAt(x: number): number {
    return Math.round(this.binAt(x));
  }

  spanOf(item: number): readonly [number, number] {
    return [this.placeOf(item - 0.5), this.placeOf(item + 0.5)];
  }

  marksAt(): readonly { x: number; y: number }[] {
    return [];
  }

  readOut(item: number): readonly ReadOut[] {
    const { intended, added, tableLength, sampleRateHz, cycles } = this.data;
    const level = (amplitude: number) => formatQuantity(levelDb(amplitude), 'dBFS', { decimals: 2 });
    const said = [
      {
        label: item === 0 ? 'mean, harmonic' : cycles > 1 ? 'harmonic of the loop' : 'harmonic',
        value: String(item),
      },
    ];
    if (sampleRateHz !== undefined) {
      said.push({
        label: 'at',
        value: formatQuantity((item * sampleRateHz) / tableLength, 'Hz', { significant: 6 }),
      });
    }
    said.push(
      { label: 'intended', value: level(intended[item]) },
      { label: 'added', value: level(added[item]) },
    );
    return said;
  }

  summary(): string {
    const { intended, added, tableLength } = this.data;
    const strong = [...intended.keys()]
      .slice(1)
      .filter((bin) => levelDb(intended[bin]) > this.floorDb)
      .sort((a, b) => intended[b] - intended[a]);
    const said = (bin: number, amplitude: number) =>
      `harmonic ${bin} at ${formatQuantity(levelDb(amplitude), 'dBFS', { decimals: 1 })}`;
    const lines = strong.slice(0, 5).map((bin) => said(bin, intended[bin]));
    const worst = this.strongestAdded;
    return (
      `Spectrum of the table's loop, harmonics 0 to ${Math.floor(tableLength / 2)}. ` +
      `${strong.length} intended ${strong.length === 1 ? 'line' : 'lines'} above ${this.floorDb} dBFS` +
      `${lines.length > 0 ? `, the strongest: ${lines.join(', ')}` : ''}. ` +
      `The strongest line that quantising added: ${said(worst, added[worst])}.`
    );
  }

  csv(): string {
    const { amplitudes, intended, added, tableLength, sampleRateHz } = this.data;
    const hertz = sampleRateHz === undefined ? '' : ',frequency_hz';
    const rows = [`harmonic${hertz},amplitude,level_dbfs,intended,added`];
    for (let bin = 0; bin < added.length; bin += 1) {
      const at = sampleRateHz === undefined ? '' : `,${(bin * sampleRateHz) / tableLength}`;
      rows.push(`${bin}${at},${amplitudes[bin]},${levelDb(amplitudes[bin])},${intended[bin]},${added[bin]}`);
    }
    return `${rows.join('\n')}\n`;
  }

  /** Wide, but never so wide that stems side by side run together. */
  private stemWidth(area: PlotArea): number {
    const wide = 2.4 * area.unit;
    if (this.shown.frequency === 'log') return wide;
    return Math.min(wide, Math.max(area.unit, (0.5 * area.width) / (area.to - area.from)));
  }

  private firstShown(area: PlotArea): number {
    return Math.max(this.items()[0], Math.floor(this.binAt(area.from)));
  }

  /** From this bin on, neighbours stand too close to be drawn apart, and columns of pixels show their strongest. */
  private firstDense(area: PlotArea): number {
    const spacing = 3 * area.unit;
    const perUnit = area.width / (area.to - area.from);
    const count = this.data.added.length;
    if (this.shown.frequency === 'linear') return perUnit >= spacing ? count : this.firstShown(area);
    // log10((k + 1)/k)·perUnit < spacing
    return Math.min(count, Math.max(this.firstShown(area), Math.ceil(1 / (10 ** (spacing / perUnit) - 1))));
  }

  /** Says which lines are which, each with the head that its lines have, near its strongest line in sight. */
  private labels(
    pen: Pen,
    area: PlotArea,
    theme: PlotTheme,
    styles: Record<'intended' | 'added', StemStyle>,
  ) {
    const { intended, added } = this.data;
    const { unit } = area;
    const level = formatQuantity(levelDb(added[this.strongestAdded]), 'dBFS', { decimals: 1 });
    const most = area.width > 480 * unit ? `added by quantising, at most ${level}` : `added, ≤ ${level}`;
    const [low] = this.yRange();
    this.room.measure(area, this, [intended, added], this.items()[0]);
    const labels = [
      { name: 'intended', words: 'intended', lines: intended, color: theme.water },
      { name: 'added', words: most, lines: added, color: theme.brick },
    ] as const;
    labels.forEach(({ name, words, lines, color }, index) => {
      const bin = this.strongestInSight(area, lines);
      const height = this.heightOf(lines[bin]);
      if (!(height > low)) return;
      const width = (words.length * letterPx + keyPx) * unit;
      const at = { x: area.x(this.placeOf(bin)), y: area.y(height) };
      const size = { width, height: wordsPx * unit, head: 8 * unit };
      // Where stems fill it all, the label lies over them.
      const spot = this.room.find(area, name, at, size) ?? {
        left: area.right - width,
        y: area.top + (9 + 17 * index) * unit,
      };
      pen.text(words, spot.left + keyPx * unit, spot.y, { color, weight: 650, halo: theme.paper });
      pen.begin();
      layHead(pen, styles[name], spot.left + 5 * unit, spot.y, styles[name].radius);
      pen.fill(color);
    });
  }

  private strongestInSight(area: PlotArea, lines: Float64Array): number {
    let best = Math.max(this.firstShown(area), Math.ceil(this.binAt(area.from)), 1);
    const last = Math.min(lines.length - 1, Math.floor(this.binAt(area.to)));
    for (let bin = best + 1; bin <= last; bin += 1) if (lines[bin] > lines[best]) best = bin;
    return Math.min(best, lines.length - 1);
  }

  private levelAxis(): AxisSpec {
    const isDb = () => this.shown.level === 'db';
    return {
      side: 'left',
      get title() {
        return isDb() ? 'level in dBFS' : 'amplitude, full scale = 1';
      },
      ticks: (min, max, px) =>
        isDb()
          ? decimalTicks(min, Math.min(max, 0), Math.min(6, px / 32))
          : decimalTicks(min, max, Math.min(5, px / 36)),
      text: tickText,
      hasGrid: true,
    };
  }

  private harmonicAxis(): AxisSpec {
    return {
      side: 'bottom',
      title: 'harmonic',
      ticks: (min, max, px) =>
        this.shown.frequency === 'log'
          ? logTicks(min, max - ((max - min) / px) * titleRoom, px / 56)
          : wholeTicks(Math.max(0, min), max - ((max - min) / px) * titleRoom, px / 64),
      text: (x) => String(Math.round(this.binAt(x))),
    };
  }

  private hertzAxis(): AxisSpec {
    const binWidth = () => (this.data.sampleRateHz ?? 1) / this.data.tableLength;
    return {
      side: 'top',
      title: '',
      ticks: (min, max, px) => {
        const width = binWidth();
        if (this.shown.frequency === 'linear') {
          return decimalTicks(Math.max(0, min) * width, max * width, px / 96).map((hertz) => hertz / width);
        }
        const shift = Math.log10(width);
        return logTicks(min + shift, max + shift, px / 110).map((x) => x - shift);
      },
      text: (x) => formatQuantity(this.binAt(x) * binWidth(), 'Hz'),
    };
  }
}

/** Bin of the largest amplitude, DC left out. */
function strongest(amplitudes: Float64Array): number {
  let best = Math.min(1, amplitudes.length - 1);
  for (let bin = 2; bin < amplitudes.length; bin += 1) if (amplitudes[bin] > amplitudes[best]) best = bin;
  return best;
}
