import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { fixed } from '../numbers.ts';
import type { ShownFigure } from './shown-figure.ts';

/** A band of a sixteenth of 0…fs/2 must hold a line at least. */
const shortestTable = 32;

/**
 * Power of what quantising added in the lowest sixteenth of the spectrum, lines 1 ≤ k ≤ N/32, in dB of a sine of
 * amplitude 1: `10·log10( Σ A_k(e)² )`. `null` where the table is too short to have such a band.
 */
export function lowBandNoiseDb(added: Float64Array, tableLength: number): number | null {
  if (tableLength < shortestTable) return null;
  let power = 0;
  for (let k = 1; k <= tableLength / 32; k += 1) power += added[k] ** 2;
  return 10 * Math.log10(power);
}

/** What noise shaping is for, as a figure. */
export function lowBandNoise({ spectrum, definition }: TableAnswer): ShownFigure {
  const level = lowBandNoiseDb(spectrum.added, definition.table.length);
  // Below this it is the arithmetic that is seen, and no noise of the table.
  const isThere = level !== null && level > -240;
  return {
    id: 'lowBandNoiseDb',
    label: 'Low-band noise',
    value: isThere ? fixed(level, 1) : level === null ? '–' : 'none',
    unit: isThere ? 'dBFS' : undefined,
    meaning:
      'All that quantising added in the lowest sixteenth of the spectrum, up to a thirty-second of the sample rate, where a slow wave lies and a filter leaves everything.',
    formula: '10·log10( Σ A_k(e)² ), 1 ≤ k ≤ N/32; A_k are amplitudes of the spectrum of the error',
    good: 'The lower the better. Noise shaping lowers it and pays with noise further up.',
    missing: level === null ? `A table of fewer than ${shortestTable} entries has no such band.` : undefined,
  };
}
