import { useLayoutEffect, useState } from 'react';
import { ErrorScene } from './error-scene.ts';
import { Plot } from './plot.tsx';
import { usePlotLink } from './plot-link.ts';

export interface ErrorPlotProps {
  /** Code value less the ideal, in LSB, one an entry. */
  errorLsb: Float64Array;
}

/** The error in LSB, over the same entries as the cycle and with the same cursor and zoom. */
export function ErrorPlot({ errorLsb }: ErrorPlotProps) {
  const [scene] = useState(() => new ErrorScene(errorLsb));
  const link = usePlotLink();
  useLayoutEffect(() => {
    scene.set(errorLsb);
  }, [scene, errorLsb]);
  return <Plot title="Error" kind="error" scene={scene} link={link} version={errorLsb} />;
}
