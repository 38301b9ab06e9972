import type { HarmonicsSource } from '../../../../shared/contract/index.ts';
import { removeBar, setBar } from './bars.ts';
import { addStep } from './bar-scale.ts';

/** What a key does on a bar. */
export type BarAct =
  | { kind: 'go'; harmonic: number }
  | { kind: 'change'; next: HarmonicsSource }
  | { kind: 'type'; start: string | number };

export interface BarContext {
  source: HarmonicsSource;
  harmonic: number;
  amplitude: number;
  /** Harmonics that the field shows. */
  shown: number;
}

const fine = 0.01;
const coarse = 0.1;

/** Reads a key on a focused bar; `null` where the field has no use for it. */
export function actOfKey(
  { key, shiftKey }: { key: string; shiftKey: boolean },
  at: BarContext,
): BarAct | null {
  const { source, harmonic, amplitude, shown } = at;
  const go = (goal: number): BarAct => ({ kind: 'go', harmonic: Math.min(shown, Math.max(1, goal)) });
  const by = (step: number): BarAct => ({
    kind: 'change',
    next: setBar(source, { harmonic, amplitude: addStep(amplitude, step) }),
  });
  switch (key) {
    case 'ArrowLeft':
      return go(harmonic - 1);
    case 'ArrowRight':
      return go(harmonic + 1);
    case 'Home':
      return go(1);
    case 'End':
      return go(shown);
    case 'ArrowUp':
      return by(shiftKey ? coarse : fine);
    case 'ArrowDown':
      return by(shiftKey ? -coarse : -fine);
    case 'PageUp':
      return by(coarse);
    case 'PageDown':
      return by(-coarse);
    case 'Delete':
    case 'Backspace':
      return { kind: 'change', next: removeBar(source, harmonic) };
    case 'Enter':
    case 'F2':
      return { kind: 'type', start: amplitude };
    default:
      return /^[\d.,−-]$/u.test(key) ? { kind: 'type', start: key } : null;
  }
}
