import { useEffect, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { createPlotLink, type PlotLink } from '../../../plots/index.ts';
import { readSight, writeSight } from './sight.ts';

const parameter = 'sight';

/** Zooming and panning is written down once it rests, in milliseconds. */
const restMs = 300;

/** Ties the plots over the same entries together and keeps the part in sight in the URL. */
export function useSightInUrl(): PlotLink {
  const [parameters, setParameters] = useSearchParams();
  const [link] = useState(() => {
    const made = createPlotLink();
    made.setView(readSight(parameters.get(parameter)));
    return made;
  });
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    const write = () => {
      const text = writeSight(link.view());
      if (text === parameters.get(parameter)) return;
      setParameters(
        (before) => {
          if (text === null) before.delete(parameter);
          else before.set(parameter, text);
          return before;
        },
        { replace: true, preventScrollReset: true },
      );
    };
    const stop = link.subscribe(() => {
      clearTimeout(timer);
      timer = setTimeout(write, restMs);
    });
    return () => {
      clearTimeout(timer);
      stop();
    };
  }, [link, parameters, setParameters]);
  return link;
}
