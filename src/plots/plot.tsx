import { useEffect, useId, useLayoutEffect, useRef, useState, type ReactNode } from 'react';
import { IconButton, Menu, icons, useToast } from '../components/index.ts';
import type { Live } from '../live/index.ts';
import type { ExportFormat } from './export-plot.ts';
import type { PlotArea } from './plot-area.ts';
import type { PlotLink } from './plot-link.ts';
import { PlotSurface } from './plot-surface.ts';
import type { Scene } from './scene.ts';

export interface PlotProps<Data> {
  title: string;
  /** Which drawing it is; sets its height and the names of exported files. */
  kind:
    | 'cycle'
    | 'error'
    | 'spectrum'
    | 'spurs'
    | 'waveform'
    | 'lines'
    | 'linearity'
    | 'trials'
    | 'bits'
    | 'heard'
    | 'response'
    | 'glide';
  scene: Scene<Data>;
  /** What the scene shows. Each change is drawn with the next frame. */
  data: Live<Data>;
  link: PlotLink;
  /** A new value whenever the scene draws the same data in another way. */
  manner?: unknown;
  hasZoom?: boolean;
  /** False where the data never rest: its key facts are then told anew now and then, rather than once they rest. */
  isSteady?: boolean;
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
const summaryEveryMs = 2_000;
const zoomStep = 1.5;

/** The frame of every plot: title, read-out, drawing, tools, and its key facts in words. */
export function Plot<Data>({
  title,
  kind,
  scene,
  data,
  link,
  manner,
  hasZoom = false,
  isSteady = true,
  controls,
  children,
  ...events
}: PlotProps<Data>) {
  const titleId = useId();
  const toast = useToast();
  const surface = useRef<HTMLDivElement>(null);
  const overlay = useRef<HTMLDivElement>(null);
  const readOut = useRef<HTMLSpanElement>(null);
  const drawing = useRef<PlotSurface<Data>>(null);
  const [summary, setSummary] = useState('');

  useLayoutEffect(() => {
    if (!surface.current || !overlay.current || !readOut.current) return;
    const made = new PlotSurface(
      { surface: surface.current, overlay: overlay.current, readOut: readOut.current },
      scene,
      data,
      link,
    );
    drawing.current = made;
    return () => {
      made.destroy();
      drawing.current = null;
    };
  }, [scene, data, link]);

  useLayoutEffect(() => {
    if (!drawing.current) return;
    drawing.current.onDrawn = events.onDrawn;
    drawing.current.renew();
  }, [scene, data, link, manner, events.onDrawn]);

  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    const sum = () => {
      if (!isSteady && timer !== undefined) return;
      clearTimeout(timer);
      timer = setTimeout(
        () => {
          timer = undefined;
          setSummary(scene.summary());
        },
        isSteady ? summaryDelayMs : summaryEveryMs,
      );
    };
    const end = data.subscribe(sum);
    sum();
    return () => {
      end();
      clearTimeout(timer);
    };
  }, [scene, data, manner, isSteady]);

  const save = async (format: ExportFormat) => {
    if (!surface.current) return;
    try {
      const { exportPlot } = await import('./export-plot.ts');
      await exportPlot(format, kind, title, scene, link, surface.current);
    } catch (fault) {
      toast({
        message: `The file could not be made: ${fault instanceof Error ? fault.message : String(fault)}`,
        tone: 'fault',
      });
    }
  };

  return (
    <figure className={`plot plot-${kind}`} aria-labelledby={titleId}>
      <div className="plot-head">
        <h2 id={titleId}>{title}</h2>
        {controls && <div className="plot-controls">{controls}</div>}
        <div className="plot-tools">
          {hasZoom && (
            <>
              <IconButton
                size="small"
                label="Zoom in"
                icon={icons.zoomIn}
                onPress={() => drawing.current?.zoom(1 / zoomStep)}
              />
              <IconButton
                size="small"
                label="Zoom out"
                icon={icons.zoomOut}
                onPress={() => drawing.current?.zoom(zoomStep)}
              />
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
            items={[
              { id: 'svg', label: 'Drawing as SVG', onSelect: () => void save('svg') },
              { id: 'png', label: 'Drawing as PNG', onSelect: () => void save('png') },
              { id: 'csv', label: 'All data as CSV', onSelect: () => void save('csv') },
            ]}
          />
        </div>
      </div>
      <div className="plot-field">
        <div className="plot-readout">
          <span className={`plot-hint plot-hint-${kind}`}>
            <span className="for-mouse">Point at the drawing, or press ← → on it, to read a value.</span>
            <span className="for-touch">Touch the drawing to read a value.</span>
          </span>
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
