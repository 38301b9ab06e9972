import { Refusal, showValue, type PwmOutput } from '../contract/index.ts';
import { pwmCarrierHz, pwmDuty } from '../output-stage/index.ts';

/** The pulses of an envelope, one a period of the carrier. */
export interface PulseTrain {
  readonly periodS: number;
  /** Share of each period that the pin is high, 0…1. */
  readonly duties: Float64Array;
  /**
   * When each pulse rises and falls, in seconds from the first period's start. Fast pulses begin with their period;
   * phase-correct ones lie in its middle. A pulse of duty 0 falls as it rises.
   */
  readonly risesS: Float64Array;
  readonly fallsS: Float64Array;
}

export interface PulseTrainOptions {
  readonly pwm: Pick<PwmOutput, 'bits' | 'mode' | 'prescaler'>;
  readonly clockHz: number;
  /** Periods of the carrier that each entry lasts, a whole number from 1. */
  readonly periodsPerEntry: number;
}

const periodsAtMost = 2 ** 24;

/**
 * What a PWM pin puts out for the codes of a table, each held for some periods.
 *
 * @param codes 0…2^bits − 1
 * @throws {Refusal} where there would be more than 2^24 periods, or a code is wider than the PWM.
 */
export function pulseTrain(
  codes: Uint16Array,
  { pwm, clockHz, periodsPerEntry }: PulseTrainOptions,
): PulseTrain {
  const most = Math.floor(periodsAtMost / codes.length);
  if (!Number.isInteger(periodsPerEntry) || periodsPerEntry < 1 || periodsPerEntry > most) {
    throw new Refusal({
      path: 'periodsPerEntry',
      value: showValue(periodsPerEntry),
      allowed: `a whole number from 1 to ${most}`,
    });
  }
  const top = 2 ** pwm.bits - 1;
  const tooWide = codes.findIndex((code) => code > top);
  if (tooWide >= 0) {
    const allowed = `codes up to ${top}, which ${pwm.bits} bits hold`;
    throw new Refusal({ path: `codes[${tooWide}]`, value: showValue(codes[tooWide]), allowed });
  }
  const periodS = 1 / pwmCarrierHz(clockHz, pwm);
  const count = codes.length * periodsPerEntry;
  const duties = new Float64Array(count);
  const risesS = new Float64Array(count);
  const fallsS = new Float64Array(count);
  for (let period = 0; period < count; period += 1) {
    const duty = pwmDuty(codes[Math.floor(period / periodsPerEntry)], pwm);
    const late = pwm.mode === 'fast' ? 0 : (1 - duty) / 2;
    duties[period] = duty;
    risesS[period] = (period + late) * periodS;
    fallsS[period] = (period + late + duty) * periodS;
  }
  return { periodS, duties, risesS, fallsS };
}
