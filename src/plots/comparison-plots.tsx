import { useState } from 'react';
import { useAsLive } from '../live/index.ts';
import { DifferenceScene, type DifferenceData } from './difference-scene.ts';
import { OverlayScene, type OverlayData } from './overlay-scene.ts';
import { createPlotLink, usePlotLink } from './plot-link.ts';
import { Plot } from './plot.tsx';
import { SpectraScene, type SpectraData } from './spectra-scene.ts';

/** The stairs of two tables over each other. */
export function OverlayPlot({ data }: { data: OverlayData }) {
  const [scene] = useState(() => new OverlayScene(data));
  return (
    <Plot
      title="Both cycles"
      kind="cycle"
      scene={scene}
      data={useAsLive(data)}
      link={usePlotLink()}
      hasZoom
    />
  );
}

/** How much each entry differs, over the same entries and with the same cursor and zoom. */
export function DifferencePlot({ data }: { data: DifferenceData }) {
  const [scene] = useState(() => new DifferenceScene(data));
  return (
    <Plot
      title="Difference of the codes"
      kind="error"
      scene={scene}
      data={useAsLive(data)}
      link={usePlotLink()}
    />
  );
}

/** The spectra of two tables over each other. */
export function SpectraPlot({ data }: { data: SpectraData }) {
  const [scene] = useState(() => new SpectraScene(data));
  const [link] = useState(createPlotLink);
  return (
    <Plot title="Both spectra" kind="spectrum" scene={scene} data={useAsLive(data)} link={link} hasZoom />
  );
}
