import { useEffect } from 'react';
import { theBench } from '../state/use-bench.ts';

/** One drag is one step of undo, and so is what was typed until the field is left. */
export function useSteps(): void {
  useEffect(() => {
    const { hold, release, seal } = theBench();
    const ends = ['pointerup', 'pointercancel', 'blur'] as const;
    addEventListener('pointerdown', hold, true);
    for (const name of ends) addEventListener(name, release);
    addEventListener('focusout', seal);
    return () => {
      removeEventListener('pointerdown', hold, true);
      for (const name of ends) removeEventListener(name, release);
      removeEventListener('focusout', seal);
    };
  }, []);
}
