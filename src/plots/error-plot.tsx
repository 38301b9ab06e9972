import { useState } from 'react';
import type { Live } from '../live/index.ts';
import { ErrorScene } from './error-scene.ts';
import { Plot } from './plot.tsx';
import { usePlotLink } from './plot-link.ts';

export interface ErrorPlotProps {
  /** Code value less the ideal, in LSB, one an entry. */
  errorLsb: Live<Float64Array>;
}

/** The error in LSB, over the same entries as the cycle and with the same cursor and zoom. */
export function ErrorPlot({ errorLsb }: ErrorPlotProps) {
  const [scene] = useState(() => new ErrorScene(errorLsb.now()));
  const link = usePlotLink();
  return <Plot title="Error" kind="error" scene={scene} data={errorLsb} link={link} />;
}
