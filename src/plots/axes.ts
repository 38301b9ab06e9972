import type { Pen } from './pen.ts';
import type { PlotArea } from './plot-area.ts';
import type { PlotTheme } from './plot-theme.ts';
import type { AxisSpec } from './scene.ts';

/** Room for each side's ticks and titles, in CSS pixels; the same for every plot, so that stacked plots line up. */
export const gutters = { left: 50, right: 56, top: 24, bottom: 26 };
/** From the frame to the ticks; at the sides with room for the half of a point's handle that stands over the edge. */
export const tickGaps = { left: 10, right: 10, top: 6, bottom: 6 } as const;
/** More room at the top where ticks stand there too. */
export const topTicks = 18;

/** Titles keep the distance from the frame that its heading keeps. */
export const titleInset = 12;

/** Titles of the axes, set level at their ends so that nobody has to turn the head. */
export function drawAxisTitles(pen: Pen, area: PlotArea, axes: readonly AxisSpec[], theme: PlotTheme): void {
  const { unit } = area;
  const hasTop = axes.some((axis) => axis.side === 'top');
  const titleY = area.top - (hasTop ? 14 + topTicks : 14) * unit;
  for (const axis of axes) {
    const style = { color: theme.inkSoft } as const;
    switch (axis.side) {
      case 'left':
        pen.text(axis.title, area.left - (gutters.left - titleInset) * unit, titleY, style);
        break;
      case 'right':
        pen.text(axis.title, area.right + (gutters.right - titleInset) * unit, titleY, {
          ...style,
          align: 'right',
        });
        break;
      case 'top':
        pen.text(axis.title, area.right + (gutters.right - titleInset) * unit, titleY, {
          ...style,
          align: 'right',
        });
        break;
      case 'bottom':
        pen.text(axis.title, area.right + (gutters.right - titleInset) * unit, area.bottom + 15 * unit, {
          ...style,
          align: 'right',
          halo: theme.paper,
        });
        break;
    }
  }
}

/** Lines and labels of the axes, for a file; on the screen the plotting library draws the same ticks. */
export function drawAxes(pen: Pen, area: PlotArea, axes: readonly AxisSpec[], theme: PlotTheme): void {
  const { unit } = area;
  const label = { color: theme.inkSoft, face: 'figures' } as const;
  const across = (x1: number, y1: number, x2: number, y2: number) => {
    pen.begin();
    pen.move(x1, y1);
    pen.line(x2, y2);
    pen.stroke(theme.edge, unit);
  };
  for (const axis of axes) {
    const gap = tickGaps[axis.side] * unit;
    if (axis.side === 'left' || axis.side === 'right') {
      for (const tick of axis.ticks(area.low, area.high, area.height / unit)) {
        const y = Math.round(area.y(tick)) + 0.5;
        if (axis.hasGrid) across(area.left, y, area.right, y);
        if (axis.side === 'left') pen.text(axis.text(tick), area.left - gap, y, { ...label, align: 'right' });
        else pen.text(axis.text(tick), area.right + gap, y, label);
      }
    } else {
      for (const tick of axis.ticks(area.from, area.to, area.width / unit)) {
        const x = Math.round(area.x(tick)) + 0.5;
        const y = axis.side === 'bottom' ? area.bottom + gap + 8 * unit : area.top - gap - 8 * unit;
        if (axis.hasGrid) across(x, area.top, x, area.bottom);
        pen.text(axis.text(tick), x, y, { ...label, align: 'center' });
      }
    }
  }
  pen.begin();
  pen.move(area.left, area.bottom);
  pen.line(area.right, area.bottom);
  pen.stroke(theme.line, unit);
}
