import { useCallback, useEffect, useRef, useState } from 'react';
import type { Definition } from '../../../../shared/contract/index.ts';
import { usualAxes, type SizeAxes, type SizeCell } from '../../../../shared/size-search/index.ts';
import { startFigures, type FiguresRun } from '../../../workers/figures-client.ts';
import { leavesOut } from './left-out.ts';

export interface SearchState {
  readonly axes: SizeAxes;
  readonly cells: readonly SizeCell[];
  readonly isRunning: boolean;
  readonly fault: string | null;
}

/**
 * Goes through the sizes off the main thread, beginning at once; can be stopped, and begun again.
 *
 * @param keepsAll whether lengths that leave partials of the wave out are passed over
 */
export function useSearch(
  definition: Definition,
  keepsAll: boolean,
): SearchState & { stop: () => void; begin: () => void } {
  const [state, setState] = useState<SearchState>(() => ({
    axes: axesWith(definition, keepsAll),
    cells: [],
    isRunning: true,
    fault: null,
  }));
  const run = useRef<FiguresRun | null>(null);

  const stop = useCallback(() => {
    run.current?.stop();
    run.current = null;
    setState((now) => ({ ...now, isRunning: false }));
  }, []);

  const launch = useCallback(() => {
    run.current?.stop();
    run.current = startFigures((message) => {
      if (message.kind === 'cells') setState((now) => ({ ...now, cells: [...now.cells, ...message.cells] }));
      else if (message.kind === 'done') setState((now) => ({ ...now, isRunning: false }));
      else if (message.kind === 'failed')
        setState((now) => ({ ...now, isRunning: false, fault: message.message }));
    });
    run.current.ask({ kind: 'sizes', definition, axes: axesWith(definition, keepsAll) });
  }, [definition, keepsAll]);

  useEffect(() => {
    launch();
    return () => {
      run.current?.stop();
      run.current = null;
    };
  }, [launch]);

  const begin = () => {
    setState({ axes: axesWith(definition, keepsAll), cells: [], isRunning: true, fault: null });
    launch();
  };

  return { ...state, stop, begin };
}

/** The usual sizes, and the one on the bench where it is none of them. */
function axesWith(definition: Definition, keepsAll: boolean): SizeAxes {
  const { lengths, bits } = usualAxes;
  const { length } = definition.table;
  const all = lengths.includes(length) ? lengths : [...lengths, length].sort((one, other) => one - other);
  const whole = all.filter((each) => !leavesOut(definition, each));
  return { lengths: keepsAll && whole.length > 0 ? whole : all, bits };
}
