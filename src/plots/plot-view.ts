import type { PlotView } from './plot-link.ts';
import type { Scene } from './scene.ts';

/** The part in sight: the link's, kept inside the scene's range; the whole where there is none that fits. */
export function viewWithin(scene: Scene, view: PlotView | null): PlotView {
  const [from, to] = scene.extent();
  if (view === null || view.from >= to || view.to <= from) return { from, to };
  return { from: Math.max(from, view.from), to: Math.min(to, view.to) };
}

/** The view narrowed (`factor` < 1) or widened about a place that stays where it is. `null` where all comes in sight. */
export function zoomed(scene: Scene, view: PlotView, factor: number, about: number): PlotView | null {
  const [from, to] = scene.extent();
  const span = Math.min(to - from, Math.max(scene.leastSpan, (view.to - view.from) * factor));
  if (span >= to - from) return null;
  const share = (about - view.from) / (view.to - view.from);
  return shifted(scene, { from: about - share * span, to: about + (1 - share) * span }, 0);
}

/** The view moved sideways, stopped at the ends of the scene. */
export function shifted(scene: Scene, view: PlotView, by: number): PlotView {
  const [from, to] = scene.extent();
  const span = view.to - view.from;
  const start = Math.min(Math.max(view.from + by, from), to - span);
  return { from: start, to: start + span };
}

/** The view moved just so far that an item lies in it. */
export function showing(scene: Scene, view: PlotView, item: number): PlotView {
  const [from, to] = scene.spanOf(item);
  if (from < view.from) return shifted(scene, view, from - view.from);
  return to > view.to ? shifted(scene, view, to - view.to) : view;
}
