import { useEffect, useId, useLayoutEffect, useRef, useState, type ReactNode } from 'react';
import { IconButton, Menu, icons } from '../components/index.ts';
import { exportItems } from './export-plot.ts';
import type { PlotArea } from './plot-area.ts';
import type { PlotLink } from './plot-link.ts';
import { PlotSurface } from './plot-surface.ts';
import type { Scene } from './scene.ts';

export interface PlotProps {
  title: string;
  /** Which drawing it is; sets its height and the names of exported files. */
  kind: 'cycle' | 'error' | 'spectrum';
  scene: Scene;
  link: PlotLink;
  /** A new value whenever the scene holds something new. */
  version: unknown;
  hasZoom?: boolean;
  /** Stand right of the title. */
  controls?: ReactNode;
  /** Lies over the area inside the axes. */
  children?: ReactNode;
  /** After each drawing; the area is in CSS pixels. */
  onDrawn?: (area: PlotArea) => void;
  onDoublePress?: (x: number, y: number) => void;
  onEnter?: (item: number) => void;
}

/** The summary is for reading, not for listening to while something is dragged. */
const summaryDelayMs = 400;

/** The frame of every plot: title, read-out, drawing, tools, and its key facts in words. */
export function Plot({
  title,
  kind,
  scene,
  link,
  version,
  hasZoom = false,
  controls,
  children,
  ...events
}: PlotProps) {
  const titleId = useId();
  const figure = useRef<HTMLElement>(null);
  const surface = useRef<HTMLDivElement>(null);
  const overlay = useRef<HTMLDivElement>(null);
  const readOut = useRef<HTMLSpanElement>(null);
  const drawing = useRef<PlotSurface>(null);
  const [summary, setSummary] = useState('');

  useLayoutEffect(() => {
    if (!figure.current || !surface.current || !overlay.current || !readOut.current) return;
    const made = new PlotSurface(
      {
        figure: figure.current,
        surface: surface.current,
        overlay: overlay.current,
        readOut: readOut.current,
      },
      scene,
      link,
    );
    drawing.current = made;
    return () => {
      made.destroy();
      drawing.current = null;
    };
  }, [scene, link]);

  useLayoutEffect(() => {
    if (!drawing.current) return;
    drawing.current.onDrawn = events.onDrawn;
    drawing.current.renew();
  }, [scene, link, version, events.onDrawn]);

  useEffect(() => {
    const timer = setTimeout(() => {
      setSummary(scene.summary());
    }, summaryDelayMs);
    return () => {
      clearTimeout(timer);
    };
  }, [scene, version]);

  const zoomBy = (factor: number) => () => drawing.current?.zoom(factor);

  return (
    <figure ref={figure} className={`plot plot-${kind}`} aria-labelledby={titleId}>
      <div className="plot-head">
        <h3 id={titleId}>{title}</h3>
        {controls && <div className="plot-controls">{controls}</div>}
        <div className="plot-tools">
          {hasZoom && (
            <>
              <IconButton size="small" label="Zoom in" icon={icons.zoomIn} onPress={zoomBy(1 / 1.5)} />
              <IconButton size="small" label="Zoom out" icon={icons.zoomOut} onPress={zoomBy(1.5)} />
              <IconButton
                size="small"
                label="Show all"
                icon={icons.zoomAll}
                onPress={() => {
                  link.setView(null);
                }}
              />
            </>
          )}
          <Menu
            label={`Export ${title.toLowerCase()}`}
            icon={icons.download}
            items={exportItems(kind, title, scene, link, surface)}
          />
        </div>
      </div>
      <div className="plot-field">
        <div className="plot-readout">
          {kind === 'cycle' && (
            <span className="plot-hint">
              <span className="for-mouse">Point at the drawing, or press ← → on it, to read an entry.</span>
              <span className="for-touch">Touch the drawing to read an entry.</span>
            </span>
          )}
          <span ref={readOut} className="plot-cells" />
        </div>
        <div className="plot-canvas">
          <div
            ref={surface}
            className="plot-surface"
            role="slider"
            tabIndex={0}
            aria-label={`${title}: reading`}
            aria-valuenow={0}
            onKeyDown={(event) => {
              const cursor = link.cursor();
              if (event.key === 'Enter' && cursor !== null) events.onEnter?.(cursor);
              else drawing.current?.onKeyDown(event.nativeEvent);
            }}
            onBlur={() => {
              link.setCursor(null);
            }}
            onDoubleClick={(event) => {
              const { left, top } = event.currentTarget.getBoundingClientRect();
              const area = drawing.current?.area;
              if (area)
                events.onDoublePress?.(
                  area.valueAtX(event.clientX - left),
                  area.valueAtY(event.clientY - top),
                );
            }}
          />
          <div ref={overlay} className="plot-overlay">
            {children}
          </div>
        </div>
      </div>
      <figcaption className="sr-only">{summary}</figcaption>
    </figure>
  );
}
