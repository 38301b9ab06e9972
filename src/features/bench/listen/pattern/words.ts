import { patternMs, type PulsePattern } from '../../../../../shared/contract/index.ts';

const count = (value: number) => value.toLocaleString('en');
const many = (value: number, what: string) => `${count(value)} ${what}${value === 1 ? '' : 's'}`;

/** `1,150 ms`; from ten seconds on `72.5 s`. */
export const sayTime = (ms: number) =>
  ms < 10_000 ? `${count(ms)} ms` : `${(ms / 1000).toLocaleString('en', { maximumFractionDigits: 3 })} s`;

export const soundingMs = ({ steps }: PulsePattern) =>
  steps.reduce((sum, { onMs, repeats }) => sum + onMs * repeats, 0);

/** The whole pattern in a sentence or two, for those who do not see its drawing. */
export function sayPattern(pattern: PulsePattern): string {
  const { steps, endless } = pattern;
  const whole = patternMs(pattern);
  const sounding = soundingMs(pattern);
  const pulses = steps.reduce((sum, { repeats }) => sum + repeats, 0);
  const share = Math.round((100 * sounding) / whole);
  return (
    `${many(steps.length, 'step')}, ${many(pulses, 'pulse')}: of ${sayTime(whole)} it sounds ${sayTime(sounding)}, ` +
    `${share} %. ${endless ? 'Then from the beginning, for ever.' : 'Then silence.'}`
  );
}
