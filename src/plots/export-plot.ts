import { drawAxes, drawAxisTitles, gutters, titleInset, topTicks } from './axes.ts';
import { CanvasPen } from './canvas-pen.ts';
import type { Pen } from './pen.ts';
import { PlotArea } from './plot-area.ts';
import type { PlotLink } from './plot-link.ts';
import { plotTheme } from './plot-theme.ts';
import { viewWithin } from './plot-view.ts';
import type { Scene } from './scene.ts';
import { SvgPen } from './svg-pen.ts';

const margin = 12;
const titleHeight = 30;
/** PNG pixels a CSS pixel, whatever the screen. */
const pngScale = 2;

interface Sheet {
  width: number;
  height: number;
}

/** Draws the whole figure on paper of its own: title, axes and scene, for the part that is in sight. */
function drawSheet(
  pen: Pen,
  { width, height }: Sheet,
  title: string,
  scene: Scene,
  link: PlotLink,
  unit: number,
) {
  const theme = plotTheme();
  const hasTop = scene.axes.some((axis) => axis.side === 'top');
  const top = titleHeight + gutters.top + (hasTop ? topTicks : 0);
  const { from, to } = viewWithin(scene, link.view());
  const area = new PlotArea();
  area.place(
    (margin + gutters.left) * unit,
    top * unit,
    (width - 2 * margin - gutters.left - gutters.right) * unit,
    (height - top - gutters.bottom - margin) * unit,
    unit,
  );
  area.scale(from, to, ...scene.yRange(from, to));
  pen.rect(0, 0, width * unit, height * unit, theme.paper);
  pen.text(title, (margin + titleInset) * unit, (margin + 8) * unit, { color: theme.ink, weight: 700 });
  drawAxes(pen, area, scene.axes, theme);
  pen.clip(area.left, area.top, area.width, area.height + unit);
  scene.draw(pen, area, theme);
  pen.unclip();
  drawAxisTitles(pen, area, scene.axes, theme);
}

/** The plot as a file of its own, with the size it has on the screen. */
function plotSvg(sheet: Sheet, title: string, scene: Scene, link: PlotLink): string {
  const pen = new SvgPen(plotTheme());
  drawSheet(pen, sheet, title, scene, link, 1);
  return pen.document(sheet.width, sheet.height, title, scene.summary());
}

async function plotPng(sheet: Sheet, title: string, scene: Scene, link: PlotLink): Promise<Blob> {
  const canvas = document.createElement('canvas');
  canvas.width = sheet.width * pngScale;
  canvas.height = sheet.height * pngScale;
  const context = canvas.getContext('2d');
  if (!context) throw new Error('This browser gives no canvas to draw the PNG on.');
  drawSheet(new CanvasPen(context, pngScale, plotTheme()), sheet, title, scene, link, pngScale);
  return new Promise((resolve, reject) => {
    canvas.toBlob((blob) => {
      if (blob) resolve(blob);
      else reject(new Error('This browser could not write the PNG.'));
    }, 'image/png');
  });
}

function save(blob: Blob, name: string) {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(blob);
  link.download = name;
  link.click();
  // The download has the address by then; a second is beyond doubt.
  setTimeout(() => {
    URL.revokeObjectURL(link.href);
  }, 1000);
}

export type ExportFormat = 'svg' | 'png' | 'csv';

/** Writes a plot to a file of the given kind and hands it to the browser to save. The drawing has the size of `surface`. */
export async function exportPlot(
  format: ExportFormat,
  kind: string,
  title: string,
  scene: Scene,
  link: PlotLink,
  surface: { clientWidth: number; clientHeight: number },
): Promise<void> {
  const sheet = { width: surface.clientWidth, height: surface.clientHeight + titleHeight + margin };
  const name = `stepwell-${kind}.${format}`;
  if (format === 'csv') save(new Blob([scene.csv()], { type: 'text/csv' }), name);
  else if (format === 'png') save(await plotPng(sheet, title, scene, link), name);
  else save(new Blob([plotSvg(sheet, title, scene, link)], { type: 'image/svg+xml' }), name);
}
