import { Refusal } from '../../../../shared/contract/index.ts';
import { nearestPitch, pitchHz, standardA4Hz } from '../../../../shared/playback/index.ts';
import { formatQuantity, parseQuantity } from '../../../../shared/quantities/index.ts';

export type ToneReading = { readonly hz: number } | { readonly fault: string };

/** Reads a tone as a frequency (`440 Hz`, `1.2k`) or as the name of a pitch (`A4`, `C#5`, `B♭2`). */
export function readTone(text: string, a4Hz = standardA4Hz): ToneReading {
  const tidy = text.trim();
  if (/^[A-Ga-g](?![a-z])/.test(tidy)) {
    try {
      return { hz: pitchHz(tidy, a4Hz) };
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      return { fault: `“${tidy}” is not allowed. Allowed: ${error.problems[0].allowed}.` };
    }
  }
  const reading = parseQuantity(tidy, 'Hz');
  switch (reading.kind) {
    case 'number':
      return reading.value > 0
        ? { hz: reading.value }
        : { fault: `${tidy} is not allowed. Allowed: a frequency above 0 Hz.` };
    case 'ask':
      return {
        fault: `“${tidy}” can be read as ${reading.readings.map((one) => one.text).join(' or ')}. Write which is meant.`,
      };
    default:
      return { fault: `“${tidy}” is not allowed. Allowed: a frequency as 440 Hz, or a pitch as A4.` };
  }
}

/** Says a tone both ways: `440 Hz, A4`, or how far it lies from the nearest pitch. */
export function sayTone(hz: number, a4Hz = standardA4Hz): string {
  const hertz = formatQuantity(hz, 'Hz', { significant: 6 });
  if (hz < 16 || hz > 20_000) return hertz;
  const { name, cents } = nearestPitch(hz, a4Hz);
  return Math.abs(cents) < 0.05 ? `${hertz}, ${name}` : `${hertz}, ${name} ${sayCents(cents)}`;
}

/** Cents with their sign, to a hundredth where that is not naught. */
export function sayCents(cents: number): string {
  const shown = cents.toFixed(Math.abs(cents) < 10 ? 2 : 1);
  const isNaught = Number(shown) === 0;
  return `${isNaught ? '' : cents > 0 ? '+' : '−'}${isNaught ? '0' : shown.replace('-', '')} cents`;
}
