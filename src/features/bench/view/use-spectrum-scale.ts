import { useCallback, useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { SpectrumPlotProps } from '../../../plots/index.ts';

type Scale = NonNullable<SpectrumPlotProps['scale']>;

const atFirst: Scale = { level: 'db', frequency: 'linear' };

/** Scales of the spectrum, kept in the URL where they are not those at first. */
export function useSpectrumScale(): { scale: Scale; onScaleChange: (scale: Scale) => void } {
  const [parameters, setParameters] = useSearchParams();
  const level = parameters.get('level') === 'linear' ? 'linear' : atFirst.level;
  const frequency = parameters.get('frequency') === 'log' ? 'log' : atFirst.frequency;
  const onScaleChange = useCallback(
    (scale: Scale) =>
      setParameters(
        (before) => {
          for (const axis of ['level', 'frequency'] as const) {
            if (scale[axis] === atFirst[axis]) before.delete(axis);
            else before.set(axis, scale[axis]);
          }
          return before;
        },
        { replace: true, preventScrollReset: true },
      ),
    [setParameters],
  );
  return useMemo(() => ({ scale: { level, frequency }, onScaleChange }), [level, frequency, onScaleChange]);
}
