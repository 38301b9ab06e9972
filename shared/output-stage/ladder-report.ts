import type { Ladder } from '../contract/index.ts';
import { currentsOf, type LadderCurrents } from './currents.ts';
import { outputOhmsOf, voltsOf } from './ladder-volts.ts';
import { linearityOf, type Linearity } from './linearity.ts';

/** All figures of a ladder by itself (engine specification §6). */
export interface LadderReport extends Linearity, LadderCurrents {
  /** Output voltage by code, in V. */
  readonly volts: Float64Array;
  /** The same currents with the output shorted to the low rail. */
  readonly shorted: LadderCurrents;
  /** Output resistance, least and most over codes, in Ω. */
  readonly leastOutputOhms: number;
  readonly mostOutputOhms: number;
}

export function ladderReport(ladder: Ladder): LadderReport {
  const volts = voltsOf(ladder);
  const ohms = outputOhmsOf(ladder);
  return {
    volts,
    ...linearityOf(volts),
    ...currentsOf(ladder),
    shorted: currentsOf(ladder, { shorted: true }),
    leastOutputOhms: ohms.reduce((a, b) => Math.min(a, b)),
    mostOutputOhms: ohms.reduce((a, b) => Math.max(a, b)),
  };
}
