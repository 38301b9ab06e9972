import { linesOf } from '../dft/index.ts';
import { holdGain } from './filter.ts';

/** One line of a loop as it leaves the stage. */
export interface OutputLine {
  /** Multiple m of the loop's own frequency f0 = fs/N. */
  readonly multiple: number;
  readonly frequencyHz: number;
  /** Peak amplitude at the pin, as a held staircase, in the units of the values. */
  readonly heldAmplitude: number;
  /** The same after the stage. */
  readonly amplitude: number;
}

/**
 * Lines `m·f0`, m = 1…`upTo`, of a loop: held, `2·|X_{m mod N}|/N·|sin(πm/N)/(πm/N)|` (engine specification §5),
 * images and N/2 included, then through the stage.
 *
 * @param values level of each entry
 * @param gain magnitude of the stage at a frequency in Hz
 */
export function outputLines(
  values: Float64Array,
  sampleRateHz: number,
  upTo: number,
  gain: (hz: number) => number = () => 1,
): OutputLine[] {
  const size = values.length;
  const { re, im } = linesOf(values);
  return Array.from({ length: upTo }, (_, i) => {
    const multiple = i + 1;
    const bin = multiple % size;
    const line = Math.min(bin, size - bin);
    const frequencyHz = (multiple * sampleRateHz) / size;
    // A multiple of the sample rate is a zero of the hold, to the last bit.
    const held = bin === 0 ? 0 : ((2 * Math.hypot(re[line], im[line])) / size) * holdGain(multiple, size);
    return { multiple, frequencyHz, heldAmplitude: held, amplitude: held * gain(frequencyHz) };
  });
}

export interface FirstImage {
  /** `fs − f`, in Hz. */
  readonly frequencyHz: number;
  /** Level beside the tone's own, as a held staircase, in dB: `20·log10(f/(fs − f))`. */
  readonly heldDb: number;
  /** The same after the stage. */
  readonly outputDb: number;
}

/** The first image of a tone below half the sample rate, beside the tone at the same place. */
export function firstImageOf(
  toneHz: number,
  sampleRateHz: number,
  gain: (hz: number) => number = () => 1,
): FirstImage {
  const frequencyHz = sampleRateHz - toneHz;
  const heldDb = 20 * Math.log10(toneHz / frequencyHz);
  return { frequencyHz, heldDb, outputDb: heldDb + 20 * Math.log10(gain(frequencyHz) / gain(toneHz)) };
}
