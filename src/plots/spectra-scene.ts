import { formatQuantity } from '../../shared/quantities/index.ts';
import { wordsPx, type Pen } from './pen.ts';
import type { PlotArea } from './plot-area.ts';
import type { PlotTheme } from './plot-theme.ts';
import type { AxisSpec, ReadOut, Scene } from './scene.ts';
import { levelDb } from './spectrum-scene.ts';
import { drawColumns, drawHeads, drawStems, layHead, type StemScale, type StemStyle } from './stems.ts';
import { decimalTicks, tickText, wholeTicks } from './ticks.ts';

/** The spectrum of one of two tables. */
export interface OverlaidSpectrum {
  readonly name: string;
  /** `A_k` of what the codes stand for, bins 0…⌊N/2⌋ of the loop. */
  readonly amplitudes: Float64Array;
  /** K, periods of the wave in the table: bin k is harmonic k/K. */
  readonly cycles: number;
}

export interface SpectraData {
  readonly a: OverlaidSpectrum;
  readonly b: OverlaidSpectrum;
}

const floorDb = -120;
const topDb = 8;
const titleRoom = 28;
const letterPx = 7;
const keyPx = 14;

/** Lines of two tables over the harmonics of their wave: discs on wide stems for the later, diamonds for the earlier. */
export class SpectraScene implements Scene<SpectraData> {
  readonly leastSpan = 0.25;
  readonly axes: readonly AxisSpec[] = [
    {
      side: 'left',
      title: 'level in dBFS',
      ticks: (min, max, px) => decimalTicks(min, Math.min(max, 0), Math.min(6, px / 32)),
      text: tickText,
      hasGrid: true,
    },
    {
      side: 'bottom',
      title: 'harmonic',
      ticks: (min, max, px) => wholeTicks(Math.max(0, min), max - ((max - min) / px) * titleRoom, px / 64),
      text: tickText,
    },
  ];
  private data: SpectraData;

  constructor(data: SpectraData) {
    this.data = data;
  }

  set(data: SpectraData): void {
    this.data = data;
  }

  extent(): readonly [number, number] {
    const last = ({ amplitudes, cycles }: OverlaidSpectrum) => (amplitudes.length - 1) / cycles;
    return [-0.5, Math.max(last(this.data.a), last(this.data.b)) + 0.5];
  }

  yRange(): readonly [number, number] {
    return [floorDb, topDb];
  }

  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void {
    const { unit } = area;
    const styles = {
      a: { color: theme.ink, width: unit, head: 'diamond', radius: 4.2 * unit },
      b: { color: theme.water, width: this.stemWidth(area), head: 'disc', radius: 4 * unit },
    } as const satisfies Record<'a' | 'b', StemStyle>;
    // Wide stems lie under thin ones that share their place, and the heads of both over all stems.
    for (const which of ['b', 'a'] as const) {
      const { amplitudes } = this.data[which];
      const scale = scaleOf(this.data[which]);
      const dense = this.firstDense(area, this.data[which]);
      drawColumns(pen, area, scale, amplitudes, dense, styles[which]);
      drawStems(pen, area, scale, amplitudes, firstIn(area, scale), dense, styles[which]);
    }
    for (const which of ['b', 'a'] as const) {
      const { amplitudes } = this.data[which];
      const scale = scaleOf(this.data[which]);
      drawHeads(
        pen,
        area,
        scale,
        amplitudes,
        firstIn(area, scale),
        this.firstDense(area, this.data[which]),
        styles[which],
      );
    }
    this.drawLabels(pen, area, theme, styles);
  }

  items(): readonly [number, number] {
    return [0, Math.floor(this.extent()[1] - 0.5)];
  }

  itemAt(x: number): number {
    return Math.round(x);
  }

  spanOf(item: number): readonly [number, number] {
    return [item - 0.5, item + 0.5];
  }

  marksAt(): readonly { x: number; y: number }[] {
    return [];
  }

  readOut(item: number): readonly ReadOut[] {
    const { a, b } = this.data;
    const level = ({ amplitudes, cycles }: OverlaidSpectrum) =>
      item * cycles < amplitudes.length
        ? formatQuantity(levelDb(amplitudes[item * cycles]), 'dBFS', { decimals: 2 })
        : 'none there';
    return [
      { label: item === 0 ? 'mean, harmonic' : 'harmonic', value: String(item) },
      { label: a.name, value: level(a) },
      { label: b.name, value: level(b) },
    ];
  }

  summary(): string {
    return `Spectra of both tables. ${(['a', 'b'] as const).map((which) => this.sayStrongest(which)).join(' ')}`;
  }

  csv(): string {
    const { a, b } = this.data;
    const rows = ['table,bin,harmonic,amplitude,level_dbfs'];
    [a, b].forEach(({ amplitudes, cycles }, index) => {
      amplitudes.forEach((amplitude, bin) =>
        rows.push(`${index + 1},${bin},${bin / cycles},${amplitude},${levelDb(amplitude)}`),
      );
    });
    return `${rows.join('\n')}\n`;
  }

  private sayStrongest(which: 'a' | 'b'): string {
    const { name, amplitudes, cycles } = this.data[which];
    const lines = [...amplitudes.keys()]
      .slice(1)
      .sort((one, other) => amplitudes[other] - amplitudes[one])
      .slice(0, 3)
      .map((bin) => {
        const level = formatQuantity(levelDb(amplitudes[bin]), 'dBFS', { decimals: 1 });
        return `harmonic ${formatQuantity(bin / cycles, '', { significant: 5 })} at ${level}`;
      });
    return `The strongest lines of ${name}: ${lines.join(', ')}.`;
  }

  private stemWidth(area: PlotArea): number {
    const perLine = area.width / (area.to - area.from) / this.data.b.cycles;
    return Math.min(3 * area.unit, Math.max(area.unit, 0.5 * perLine));
  }

  private firstDense(area: PlotArea, { amplitudes, cycles }: OverlaidSpectrum): number {
    const perLine = area.width / (area.to - area.from) / cycles;
    return perLine >= 3 * area.unit ? amplitudes.length : Math.max(0, Math.floor(area.from * cycles));
  }

  private drawLabels(pen: Pen, area: PlotArea, theme: PlotTheme, styles: Record<'a' | 'b', StemStyle>) {
    const { unit } = area;
    (['a', 'b'] as const).forEach((which, index) => {
      const { name } = this.data[which];
      const width = (name.length * letterPx + keyPx) * unit;
      const left = area.right - width - 4 * unit;
      const y = area.top + (wordsPx * 0.7 + 17 * index) * unit;
      const { color } = styles[which];
      pen.text(name, left + keyPx * unit, y, { color, weight: 650, halo: theme.paper });
      pen.begin();
      layHead(pen, styles[which], left + 5 * unit, y, styles[which].radius);
      pen.fill(color);
    });
  }
}

const scaleOf = ({ cycles }: OverlaidSpectrum): StemScale => ({
  heightOf: levelDb,
  placeOf: (bin) => bin / cycles,
  binAt: (x) => x * cycles,
});

const firstIn = (area: PlotArea, scale: StemScale): number => Math.max(0, Math.floor(scale.binAt(area.from)));
