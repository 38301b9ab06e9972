import { useState } from 'react';
import { useAsLive } from '../../../live/index.ts';
import { Plot, createPlotLink, type PlotProps } from '../../../plots/index.ts';
import { TracesScene, type TracesData } from './traces-scene.ts';

interface TracesPlotProps {
  title: string;
  kind: PlotProps<TracesData>['kind'];
  data: TracesData;
}

/** A plot whose cursor and zoom are its own. */
export function TracesPlot({ title, kind, data }: TracesPlotProps) {
  const [scene] = useState(() => new TracesScene(data));
  const [link] = useState(createPlotLink);
  return <Plot title={title} kind={kind} scene={scene} data={useAsLive(data)} link={link} hasZoom />;
}
