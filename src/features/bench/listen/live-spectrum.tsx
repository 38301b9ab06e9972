import { useLayoutEffect, useMemo, useState } from 'react';
import { ChoiceField, Explain } from '../../../components/index.ts';
import { joined, useAsLive, useLive } from '../../../live/index.ts';
import { Plot, createPlotLink } from '../../../plots/index.ts';
import { createKeptSwitch } from './kept-switch.ts';
import { LiveSpectrumScene } from './live-spectrum-scene.ts';
import type { Readings } from './readings.ts';
import { usePredicted } from './use-predicted.ts';

const isLogKept = createKeptSwitch('stepwell.listen.log-frequency', true);

const frequencies = [
  { value: 'linear', label: 'linear' },
  { value: 'log', label: 'log' },
] as const;

/** What is heard over frequency, and behind it the lines that were predicted. */
export function LiveSpectrum({ spectrum }: { spectrum: Readings['spectrum'] }) {
  const isLog = useLive(isLogKept);
  const predicted = useAsLive(usePredicted());
  const data = useMemo(
    () => joined(spectrum, predicted, (heard, of) => ({ heard, predicted: of })),
    [spectrum, predicted],
  );
  const [scene] = useState(() => new LiveSpectrumScene(data.now(), isLog));
  const [link] = useState(createPlotLink);
  useLayoutEffect(() => {
    scene.show(isLog);
    // A place on one scale is nowhere on the other.
    link.setView(null);
  }, [scene, link, isLog]);
  return (
    <Plot
      title="Live spectrum"
      kind="heard"
      scene={scene}
      data={data}
      link={link}
      manner={isLog}
      isSteady={false}
      hasZoom
      controls={
        <>
          <span className="plot-choice">
            <span aria-hidden="true">frequency</span>
            <ChoiceField
              label="Frequency scale of the live spectrum"
              hideLabel
              value={isLog ? 'log' : 'linear'}
              options={frequencies}
              onChange={(scale) => isLogKept.set(scale === 'log')}
            />
          </span>
          <Explain title="Live spectrum">
            <p>
              Line: what leaves this browser, over the last third of a second, through a Blackman window.
              Where it stands between two bins, a tip can read up to 1.1 dB low.
            </p>
            <p>
              Rings: the lines that must be there, by the table’s own spectrum, the hold, what follows the
              converter, the volume, and where it is heard. A tip that stands in its ring is right; a tip
              without one comes from somewhere else.
            </p>
          </Explain>
        </>
      }
    />
  );
}
