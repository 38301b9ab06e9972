import type { Pen } from './pen.ts';
import type { PlotArea } from './plot-area.ts';
import type { PlotTheme } from './plot-theme.ts';

export interface AxisSpec {
  side: 'left' | 'right' | 'top' | 'bottom';
  /** Quantity and unit, set level at the end of the axis. */
  title: string;
  /** Places of the ticks, in the units of the scale the axis lies along. */
  ticks: (min: number, max: number, lengthPx: number) => number[];
  text: (tick: number) => string;
  /** Whether lines go across the drawing. */
  hasGrid?: boolean;
}

/** One thing that the read-out says about the item under the cursor. */
export interface ReadOut {
  label: string;
  value: string;
}

/** What a plot shows: data, scales and how they are drawn. The frame around it knows no more than this. */
export interface Scene<Data = never> {
  /** Takes up new data; it is drawn with the next frame. */
  set(data: Data): void;
  readonly axes: readonly AxisSpec[];
  /** Whole range of x, in the units of the scale. */
  extent(): readonly [from: number, to: number];
  /** Smallest range of x that zooming goes to. */
  readonly leastSpan: number;
  yRange(from: number, to: number): readonly [low: number, high: number];
  draw(pen: Pen, area: PlotArea, theme: PlotTheme): void;
  /** How many items the cursor can stand on: indices first…last. */
  items(): readonly [first: number, last: number];
  itemAt(x: number): number;
  /** Range of x that an item takes up. */
  spanOf(item: number): readonly [from: number, to: number];
  /** Places to mark while the cursor stands on an item. */
  marksAt(item: number): readonly { x: number; y: number }[];
  readOut(item: number): readonly ReadOut[];
  /** The drawing's key facts in words. */
  summary(): string;
  /** All the data, one row an item. */
  csv(): string;
}
