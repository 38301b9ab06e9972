import type { OutputFilter, PwmOutput } from '../contract/index.ts';
import { filterGain } from './filter.ts';

type Pwm = Pick<PwmOutput, 'bits' | 'mode'>;

/** Frequency of the pulses, in Hz: `fclk/(p·2^b)` fast, `fclk/(2p·(2^b − 1))` phase-correct. */
export function pwmCarrierHz(
  clockHz: number,
  { bits, mode, prescaler }: Pwm & Pick<PwmOutput, 'prescaler'>,
): number {
  return mode === 'fast' ? clockHz / (prescaler * 2 ** bits) : clockHz / (2 * prescaler * (2 ** bits - 1));
}

/**
 * Share of the time that the pin is high: `(code + 1)/2^b` fast and not inverting, so that code 0 still pulses;
 * `code/(2^b − 1)` phase-correct.
 */
export function pwmDuty(code: number, { bits, mode }: Pwm): number {
  return mode === 'fast' ? (code + 1) / 2 ** bits : code / (2 ** bits - 1);
}

/** Mean level of every code, in V. */
export function pwmVolts(pwm: Pwm, { vHigh, vLow }: { vHigh: number; vLow: number }): Float64Array {
  return Float64Array.from(
    { length: 2 ** pwm.bits },
    (_, code) => vLow + (vHigh - vLow) * pwmDuty(code, pwm),
  );
}

/** Peak amplitude of carrier harmonic m before the filter, in V: `2·span·|sin(πmD)|/(πm)`. */
export function pwmHarmonicVolts(harmonic: number, duty: number, spanVolts: number): number {
  // Duties 0 and 1 are no pulses: no sine of a rounded π here.
  if (duty <= 0 || duty >= 1) return 0;
  return (2 * spanVolts * Math.abs(Math.sin(Math.PI * harmonic * duty))) / (Math.PI * harmonic);
}

/** Peak amplitude of carrier harmonic m behind the filter, in V. */
export function pwmRippleVolts(
  harmonic: number,
  duty: number,
  spanVolts: number,
  carrierHz: number,
  filter: OutputFilter,
): number {
  return pwmHarmonicVolts(harmonic, duty, spanVolts) * filterGain(filter, harmonic * carrierHz);
}
