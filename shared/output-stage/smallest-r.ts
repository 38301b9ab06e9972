import { outputLimits, type Ladder } from '../contract/index.ts';
import { currentsOf } from './currents.ts';
import { voltsOf } from './ladder-volts.ts';
import { linearityOf } from './linearity.ts';
import { scaledLadder } from './resistors.ts';

export interface RLimits {
  /** What one pin may carry, in A; absent where it does not matter. */
  readonly pinAmps?: number;
  /** What all output pins may give, and what they may take, together, in A. */
  readonly totalAmps?: number;
  /** Whether the limits must hold with the output shorted to the low rail. */
  readonly shorted?: boolean;
  /** Largest |DNL| that rHigh and rLow may cause, in LSB. */
  readonly maxDnl?: number;
}

export interface SmallestR {
  /** The smallest R that keeps all limits, in Ω; null where none does. */
  readonly ohms: number | null;
  /** The limit that decides; `none` where any R will do. */
  readonly decidedBy: 'pin-current' | 'total-current' | 'dnl' | 'none';
  /** The smallest R for each limit alone, in Ω: 0 where any will do, null where none does. */
  readonly pinOhms: number;
  readonly totalOhms: number;
  readonly dnlOhms: number | null;
}

const least = outputLimits.ohms.min;
const most = 1e12;

/**
 * The smallest R whose pins and port keep their limits and whose |DNL| stays within ½ LSB in spite of rHigh and
 * rLow (engine specification §6). Resistors of the ladder's own keep their proportions. The limits are the user's to
 * take from the controller's data sheet.
 */
export function smallestR(
  ladder: Ladder,
  { pinAmps, totalAmps, shorted = false, maxDnl = 0.5 }: RLimits,
): SmallestR {
  const currentsAt = (ohms: number) => currentsOf(scaledLadder(ladder, ohms), { shorted });
  const pinOhms = pinAmps === undefined ? 0 : rootOf((R) => currentsAt(R).worstPinAmps, pinAmps);
  const totalOhms =
    totalAmps === undefined
      ? 0
      : rootOf((R) => {
          const { worstSupplyAmps, worstSinkAmps } = currentsAt(R);
          return Math.max(worstSupplyAmps, worstSinkAmps);
        }, totalAmps);
  const dnlOhms = rootOf((R) => linearityOf(voltsOf(scaledLadder(ladder, R))).maxDnl, maxDnl);

  const reasons = [
    ['pin-current', pinOhms],
    ['total-current', totalOhms],
    ['dnl', dnlOhms],
  ] as const;
  const [decidedBy, ohms] = reasons.reduce((a, b) => ((b[1] ?? Infinity) > (a[1] ?? Infinity) ? b : a));
  return {
    ohms,
    decidedBy: ohms === 0 ? 'none' : decidedBy,
    pinOhms: pinOhms ?? 0,
    totalOhms: totalOhms ?? 0,
    dnlOhms,
  };
}

/**
 * Where a figure that falls with R comes down to its limit: 0 where it is below at any R, null where it never is.
 * Currents and DNL go nearly as `1/(R + c)`, so the search is for the root of `1/figure − 1/limit`, almost straight,
 * by false position with the Illinois rule (Dowell & Jarratt 1971).
 */
function rootOf(figure: (ohms: number) => number, limit: number): number | null {
  const off = (ohms: number) => 1 / figure(ohms) - 1 / limit;
  if (off(least) >= 0) return 0;
  if (off(most) < 0) return null;
  let low: number = least;
  let high = most;
  // Decades first: the line is straight only once its ends are near.
  while (high / low > 4) {
    const middle = Math.sqrt(low * high);
    if (off(middle) < 0) low = middle;
    else high = middle;
  }
  let offLow = off(low);
  let offHigh = off(high);
  let side = 0;
  for (let turn = 0; turn < 60 && high - low > 1e-12 * high && offHigh > 1e-14 / limit; turn += 1) {
    const next = low - (offLow * (high - low)) / (offHigh - offLow);
    const at = off(next);
    if (at < 0) {
      low = next;
      offLow = at;
      if (side === -1) offHigh /= 2;
      side = -1;
    } else {
      high = next;
      offHigh = at;
      if (side === 1) offLow /= 2;
      side = 1;
    }
  }
  // Twelve digits, so that a limit of 40 mA gives 62.5 Ω and not a last bit more.
  return Number(high.toPrecision(12));
}
