import type { OpAmp } from '../contract/index.ts';
import { fullPowerBandwidthHz, largestStepOf, slewTimeS, type TableStep } from './settling.ts';

export interface OpAmpAnswer {
  /** Highest frequency of a sine of the table's span within the slew rate, in Hz. */
  readonly fullPowerBandwidthHz: number;
  readonly largestStep: TableStep;
  /** What the largest step takes at the slew rate, in s, and until ½ LSB by the bandwidth after that. */
  readonly slewTimeS: number;
  readonly settleTimeS: number;
  /** One sample, in s. */
  readonly holdS: number;
  /** What one pole at the gain-bandwidth product takes off the tone, in dB, 0 or below. */
  readonly toneDb: number;
  /** Whether the tone lies within the full-power bandwidth, and whether steps settle within one sample. */
  readonly toneFits: boolean;
  readonly stepsSettle: boolean;
}

/** Whether a voltage follower keeps up with a loop (engine specification §6). */
export function opAmpFollows(
  { slewRateVPerS, gainBandwidthHz }: OpAmp,
  {
    volts,
    codes,
    sampleRateHz,
    toneHz,
  }: { volts: ArrayLike<number>; codes: ArrayLike<number>; sampleRateHz: number; toneHz: number },
): OpAmpAnswer {
  let low = Infinity;
  let high = -Infinity;
  for (let k = 0; k < codes.length; k += 1) {
    low = Math.min(low, volts[codes[k]]);
    high = Math.max(high, volts[codes[k]]);
  }
  const bits = Math.log2(volts.length);
  const fullPowerHz = fullPowerBandwidthHz(slewRateVPerS, (high - low) / 2);
  const largestStep = largestStepOf(volts, codes);
  const slewing = slewTimeS(largestStep.volts, slewRateVPerS);
  const settling = ((bits + 1) * Math.LN2) / (2 * Math.PI * gainBandwidthHz);
  const holdS = 1 / sampleRateHz;
  return {
    fullPowerBandwidthHz: fullPowerHz,
    largestStep,
    slewTimeS: slewing,
    settleTimeS: settling,
    holdS,
    toneDb: -10 * Math.log10(1 + (toneHz / gainBandwidthHz) ** 2),
    toneFits: toneHz <= fullPowerHz,
    stepsSettle: slewing + settling <= holdS,
  };
}
