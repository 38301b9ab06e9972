import type { OpAmp, OutputFilter } from '../contract/index.ts';

/**
 * Magnitude of a filter at a frequency: 1 without one; first order `1/√(1 + x²)`, second-order Butterworth
 * `1/√(1 + x⁴)` (S. Butterworth 1930), with x the frequency over the cut-off.
 */
export function filterGain(filter: OutputFilter, hz: number): number {
  if (filter.kind === 'none') return 1;
  const x = hz / filter.cutoffHz;
  return 1 / Math.hypot(1, filter.kind === 'rc' ? x : x * x);
}

/** Cut-off of a resistor and a capacitor, `1/(2πRC)`, in Hz. */
export const rcCutoffHz = (ohms: number, farads: number): number => 1 / (2 * Math.PI * ohms * farads);

/** What a sample that is held for a whole period does to a line: `|sin(πx)/(πx)|`, x = f/fs. */
export function holdGain(hz: number, sampleRateHz: number): number {
  const x = Math.PI * (hz / sampleRateHz);
  return x === 0 ? 1 : Math.abs(Math.sin(x) / x);
}

/** What stands between the converter's levels and the output. */
export interface StageParts {
  /** Resistance of the converter's output, in Ω, and capacitance of that node, in F. */
  readonly outputOhms: number;
  readonly capacitanceF: number;
  readonly opAmp?: OpAmp;
  readonly filter: OutputFilter;
}

/** Magnitude of the whole stage for signals too small for the slew rate to matter; the hold left out. */
export function stageGain({ outputOhms, capacitanceF, opAmp, filter }: StageParts, hz: number): number {
  const pin = 1 / Math.hypot(1, 2 * Math.PI * hz * outputOhms * capacitanceF);
  const buffer = opAmp === undefined ? 1 : 1 / Math.hypot(1, hz / opAmp.gainBandwidthHz);
  return pin * buffer * filterGain(filter, hz);
}
