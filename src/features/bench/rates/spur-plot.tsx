import { useState } from 'react';
import { useAsLive } from '../../../live/index.ts';
import { Plot, createPlotLink } from '../../../plots/index.ts';
import { SpurScene, type SpurData } from './spur-scene.ts';

/** The spurs of a phase accumulator; its cursor and zoom are its own. */
export function SpurPlot({ data }: { data: SpurData }) {
  const [scene] = useState(() => new SpurScene(data));
  const [link] = useState(createPlotLink);
  return <Plot title="Spurs" kind="spurs" scene={scene} data={useAsLive(data)} link={link} hasZoom />;
}
