import type { Transfer } from '../../../../shared/contract/index.ts';
import { closedCurve, phasesOf } from '../../../../shared/waveform/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import type { HeightScale } from '../shape/index.ts';

/** Heights of a drawn wave's points before levelling, and after it, where the cycle is drawn (§3.1). */
export function heightScaleOf(table: Pick<TableAnswer, 'definition' | 'cycle'>): HeightScale | undefined {
  const { source, level, table: settings } = table.definition;
  if (source.kind !== 'points') return undefined;
  const raw = Float64Array.from(phasesOf(settings), closedCurve(source));
  const levelled = table.cycle.map((height) => unbend(height, level.transfer));
  const { gain, offset } = lineThrough(raw, levelled, settings.range === 'bipolar' ? -1 : 0);
  if (!(gain > 0)) return undefined;
  return {
    toPlot: (y) => bend(gain * y + offset, level.transfer),
    fromPlot: (height) => (unbend(height, level.transfer) - offset) / gain,
  };
}

/**
 * The straight line that levelling is but for its transfer, found from the entries themselves. Entries at an end of
 * the range may have been clipped, so they count only where no others tell the slope.
 */
function lineThrough(
  raw: Float64Array,
  levelled: Float64Array,
  lowest: number,
): { gain: number; offset: number } {
  const inside = fit(raw, levelled, (height) => height > lowest && height < 1);
  return inside.gain > 0 ? inside : fit(raw, levelled, () => true);
}

function fit(raw: Float64Array, levelled: Float64Array, counts: (height: number) => boolean) {
  let n = 0;
  let sumX = 0;
  let sumY = 0;
  for (let k = 0; k < raw.length; k += 1) {
    if (!counts(levelled[k])) continue;
    n += 1;
    sumX += raw[k];
    sumY += levelled[k];
  }
  const [meanX, meanY] = [sumX / n, sumY / n];
  let squares = 0;
  let products = 0;
  for (let k = 0; k < raw.length; k += 1) {
    if (!counts(levelled[k])) continue;
    squares += (raw[k] - meanX) ** 2;
    products += (raw[k] - meanX) * (levelled[k] - meanY);
  }
  const gain = products / squares;
  return { gain, offset: meanY - gain * meanX };
}

/** The transfer curve, straight on below 0, where it has no meaning. */
function bend(signal: number, transfer: Transfer): number {
  if (transfer === 'none' || signal <= 0) return signal;
  if (transfer === 'cie-lightness')
    return signal > 0.08 ? ((100 * signal + 16) / 116) ** 3 : (100 * signal) / 903.3;
  return signal ** transfer.gamma;
}

function unbend(height: number, transfer: Transfer): number {
  if (transfer === 'none' || height <= 0) return height;
  if (transfer === 'cie-lightness') {
    const lightness = (height * 903.3) / 100;
    return lightness > 0.08 ? (116 * Math.cbrt(height) - 16) / 100 : lightness;
  }
  return height ** (1 / transfer.gamma);
}
