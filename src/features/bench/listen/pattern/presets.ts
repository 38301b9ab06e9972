import type { PulsePattern } from '../../../../../shared/contract/index.ts';

interface Preset {
  readonly name: string;
  readonly pattern: PulsePattern;
}

const step = (onMs: number, offMs: number, repeats = 1) => ({ onMs, offMs, repeats });

/** To begin from: plain rhythms of our own, after no standard. */
export const presets: readonly Preset[] = [
  { name: 'Single mark', pattern: { steps: [step(800, 0)], endless: false } },
  { name: 'Two short, one long', pattern: { steps: [step(150, 150, 2), step(600, 0)], endless: false } },
  { name: 'Even beat', pattern: { steps: [step(250, 750)], endless: true } },
  { name: 'Quick pairs', pattern: { steps: [step(80, 110), step(80, 930)], endless: true } },
  {
    name: 'Growing longer',
    pattern: { steps: [step(90, 210), step(180, 210), step(360, 210), step(720, 0)], endless: false },
  },
];
