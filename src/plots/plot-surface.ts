import uPlot from 'uplot';
import type { Live } from '../live/index.ts';
import { drawAxisTitles, gutters, tickGaps, topTicks } from './axes.ts';
import { CanvasPen } from './canvas-pen.ts';
import { forgetFrame, onNextFrame } from './frame.ts';
import { wordsPx } from './pen.ts';
import { PlotArea } from './plot-area.ts';
import { PlotCursor } from './plot-cursor.ts';
import { attachGestures } from './plot-gestures.ts';
import type { PlotLink, PlotView } from './plot-link.ts';
import { onThemeChange, plotTheme } from './plot-theme.ts';
import { shifted, viewWithin, zoomed } from './plot-view.ts';
import type { AxisSpec, Scene } from './scene.ts';

export interface SurfaceElements {
  /** Takes the focus and holds the canvas. */
  surface: HTMLElement;
  /** Lies over the area inside the axes. */
  overlay: HTMLElement;
  readOut: HTMLElement;
}

const sides = { top: 0, right: 1, bottom: 2, left: 3 } as const;

/**
 * The plotting library's canvas, axes and scales with a scene drawn in them. Lives outside React: whatever changes only
 * asks for the next frame, and each frame draws once, with the data of that moment.
 */
export class PlotSurface<Data> {
  /** In CSS pixels from the surface's corner. */
  readonly area = new PlotArea();
  onDrawn: ((area: PlotArea) => void) | undefined;

  private readonly elements: SurfaceElements;
  private readonly scene: Scene<Data>;
  private readonly data: Live<Data>;
  private readonly link: PlotLink;
  private readonly plot: uPlot;
  private readonly pen: CanvasPen;
  private readonly canvasArea = new PlotArea();
  private readonly cursor: PlotCursor;
  private readonly endings: (() => void)[];
  private readonly size: { width: number; height: number };
  private shownData: Data;
  private shownView: PlotView | null;

  constructor(elements: SurfaceElements, scene: Scene<Data>, data: Live<Data>, link: PlotLink) {
    this.elements = elements;
    this.scene = scene;
    this.data = data;
    this.link = link;
    this.shownData = data.now();
    scene.set(this.shownData);
    this.shownView = link.view();
    const { surface } = elements;
    this.size = { width: surface.clientWidth, height: surface.clientHeight };
    this.plot = new uPlot(this.options(), [[0, 1]], surface);
    this.pen = new CanvasPen(this.plot.ctx, uPlot.pxRatio, plotTheme());
    this.cursor = new PlotCursor(elements, scene, link, this.area);

    const sizes = new ResizeObserver(([{ contentRect }]) => {
      // Asking the surface itself in each frame would lay the whole page out there and then.
      this.size.width = contentRect.width;
      this.size.height = contentRect.height;
      this.renew();
    });
    sizes.observe(surface);
    this.endings = [
      () => {
        sizes.disconnect();
      },
      onThemeChange(this.renew),
      data.subscribe(this.renew),
      link.subscribe(() => {
        if (link.view() !== this.shownView) this.renew();
        else onNextFrame(this.cursor.place);
      }),
      attachGestures(surface, {
        isZoomed: () => link.view() !== null,
        view: () => this.view(),
        setView: (view) => {
          link.setView(view);
        },
        valueAt: (px) => this.area.valueAtX(px),
        zoomAbout: (px, factor) => {
          this.zoom(factor, this.area.valueAtX(px));
        },
        panBy: (px) => {
          const { from, to } = this.view();
          link.setView(shifted(this.scene, { from, to }, (px / this.area.width) * (to - from)));
        },
        pointAt: (px) => {
          this.cursor.pointAt(px);
        },
        leave: () => {
          link.setCursor(null);
        },
      }),
    ];
    this.renew();
  }

  /** Asks for the next frame. */
  readonly renew = (): void => {
    onNextFrame(this.draw);
  };

  view(): PlotView {
    return viewWithin(this.scene, this.link.view());
  }

  /** Narrows or widens what is in sight about a place, the middle unless told. */
  zoom(factor: number, about?: number): void {
    const view = this.view();
    this.link.setView(
      zoomed(this.scene, view, factor, about ?? this.cursor.middle() ?? (view.from + view.to) / 2),
    );
  }

  onKeyDown(event: KeyboardEvent): void {
    if (this.onZoomKey(event.key) || this.cursor.onKey(event, this.view())) event.preventDefault();
  }

  destroy(): void {
    this.endings.forEach((end) => {
      end();
    });
    forgetFrame(this.draw);
    forgetFrame(this.cursor.place);
    this.cursor.destroy();
    this.plot.destroy();
  }

  private onZoomKey(key: string): boolean {
    if (key === '+' || key === '=') this.zoom(1 / 1.5);
    else if (key === '-' || key === '\u2212') this.zoom(1.5);
    else if (key === '0') this.link.setView(null);
    else return false;
    return true;
  }

  private readonly draw = (): void => {
    const { width, height } = this.size;
    if (width < gutters.left + gutters.right || height < gutters.top + gutters.bottom) return;
    const data = this.data.now();
    const isNew = !Object.is(data, this.shownData);
    if (isNew) this.scene.set(data);
    this.shownData = data;
    this.shownView = this.link.view();
    const { from, to } = this.view();
    const [low, high] = this.scene.yRange(from, to);
    this.plot.batch(() => {
      if (this.plot.width !== width || this.plot.height !== height) this.plot.setSize({ width, height });
      this.plot.setScale('x', { min: from, max: to });
      this.plot.setScale('y', { min: low, max: high });
      // Ticks may say something else though the scales are the same: codes of another depth do.
      if (isNew) this.plot.redraw(false, true);
    });
  };

  private readonly drawScene = (): void => {
    const { left, top, width, height } = this.plot.bbox;
    const unit = uPlot.pxRatio;
    const { x, y } = this.plot.scales;
    const ranges = [x.min ?? 0, x.max ?? 1, y.min ?? 0, y.max ?? 1] as const;
    this.canvasArea.place(left, top, width, height, unit);
    this.canvasArea.scale(...ranges);
    this.placeOverlay(left / unit, top / unit, width / unit, height / unit);
    this.area.scale(...ranges);

    const theme = plotTheme();
    this.pen.unit = unit;
    this.pen.faces = theme;
    // The library remembers the context's state between drawings; it must find it as it left it.
    this.plot.ctx.save();
    this.pen.clip(left, top, width, height + 1);
    this.scene.draw(this.pen, this.canvasArea, theme);
    this.pen.unclip();
    drawAxisTitles(this.pen, this.canvasArea, this.scene.axes, theme);
    this.plot.ctx.restore();

    this.cursor.place();
    this.onDrawn?.(this.area);
  };

  private placeOverlay(left: number, top: number, width: number, height: number) {
    const { area } = this;
    if (area.left === left && area.top === top && area.width === width && area.height === height) return;
    area.place(left, top, width, height, 1);
    this.elements.overlay.style.cssText = `left:${left}px;top:${top}px;width:${width}px;height:${height}px`;
  }

  private options(): uPlot.Options {
    const whole = (_plot: uPlot, min: number, max: number): [number, number] => [min, max];
    const hasTop = this.scene.axes.some((axis) => axis.side === 'top');
    const hasRight = this.scene.axes.some((axis) => axis.side === 'right');
    return {
      width: Math.max(1, this.size.width),
      height: Math.max(1, this.size.height),
      padding: [hasTop ? 0 : gutters.top, hasRight ? 0 : gutters.right, 0, 0],
      legend: { show: false },
      cursor: { show: false },
      scales: { x: { time: false, range: whole }, y: { auto: false, range: whole } },
      series: [{}],
      axes: this.scene.axes.map((axis) => this.axisOptions(axis)),
      hooks: { draw: [this.drawScene] },
    };
  }

  private axisOptions(axis: AxisSpec): uPlot.Axis {
    const isLevel = axis.side === 'left' || axis.side === 'right';
    return {
      scale: isLevel ? 'y' : 'x',
      side: sides[axis.side],
      size: axis.side === 'top' ? gutters.top + topTicks : gutters[axis.side],
      gap: tickGaps[axis.side],
      labelSize: 0,
      stroke: () => plotTheme().inkSoft,
      font: `condensed 400 ${wordsPx}px ${plotTheme().figures}`,
      ticks: { show: false },
      grid: { show: axis.hasGrid ?? false, stroke: () => plotTheme().edge, width: 1 },
      border: { show: axis.side === 'bottom', stroke: () => plotTheme().line, width: 1 },
      splits: (plot, _index, min, max) =>
        axis.ticks(min, max, (isLevel ? plot.bbox.height : plot.bbox.width) / uPlot.pxRatio),
      values: (_plot, ticks) => ticks.map(axis.text),
    };
  }
}
