import type { Report, TableSettings } from '../contract/index.ts';

export type CarrierFigures = Pick<Report, 'sinadDb' | 'enobBits' | 'thdDb' | 'thdPercent' | 'sfdrDb'>;

const none: CarrierFigures = { sinadDb: null, enobBits: null, thdDb: null, thdPercent: null, sfdrDb: null };

/** Amplitudes within this of the strongest count as equally strong. */
const equalAmplitude = 1e-9;
/** Power of "the rest" up to which a spectrum counts as a pure line. */
const purePower = 1e-22;
/** Amplitude of that power: below it there is no line, only rounding. */
const leastAmplitude = Math.sqrt(2 * purePower);
const pureThdRatio = 1e-12;
const highestHarmonic = 10;

/**
 * Figures that set one line, the carrier, against all others (§4; IEEE Std 1658-2011 for ENOB).
 *
 * @param amplitudes one-sided amplitudes of the codes' values, bins 0…⌊N/2⌋
 */
export function carrierFigures(
  amplitudes: Float64Array,
  { length, range }: Pick<TableSettings, 'length' | 'range'>,
): CarrierFigures {
  const carrier = carrierOf(amplitudes);
  if (carrier === 0) return none;

  const carrierAmplitude = amplitudes[carrier];
  let rest = 0;
  let strongestOther = 0;
  for (let k = 1; k < amplitudes.length; k += 1) {
    if (k === carrier) continue;
    const amplitude = amplitudes[k];
    rest += 2 * k === length ? amplitude * amplitude : (amplitude * amplitude) / 2;
    if (amplitude > strongestOther) strongestOther = amplitude;
  }
  const thdRatio = distortionRatio(amplitudes, carrier, length);
  const hasThd = thdRatio > pureThdRatio;
  const thd = {
    thdDb: hasThd ? 20 * Math.log10(thdRatio) : null,
    thdPercent: hasThd ? 100 * thdRatio : null,
  };
  if (rest <= purePower) return { ...none, ...thd };
  const sfdrDb = 20 * Math.log10(carrierAmplitude / strongestOther);
  if (2 * carrier === length) return { ...none, ...thd, sfdrDb };

  const sinadDb = 10 * Math.log10(carrierAmplitude ** 2 / 2 / rest);
  const fullAmplitude = range === 'bipolar' ? 1 : 0.5;
  return {
    sinadDb,
    enobBits: (sinadDb - 1.76 + 20 * Math.log10(fullAmplitude / carrierAmplitude)) / 6.02,
    ...thd,
    sfdrDb,
  };
}

/** The strongest bin k ≥ 1, the lowest of equally strong ones; 0 where there is no line at all. */
function carrierOf(amplitudes: Float64Array): number {
  let strongest = 0;
  for (let k = 1; k < amplitudes.length; k += 1) strongest = Math.max(strongest, amplitudes[k]);
  if (strongest <= leastAmplitude) return 0;
  const enough = Math.max(strongest - equalAmplitude, leastAmplitude);
  let carrier = 1;
  while (amplitudes[carrier] < enough) carrier += 1;
  return carrier;
}

/** Harmonics 2…10 of the carrier that lie below N/2, root-sum-square over the carrier. */
function distortionRatio(amplitudes: Float64Array, carrier: number, length: number): number {
  let sumOfSquares = 0;
  for (let n = 2; n <= highestHarmonic && 2 * n * carrier < length; n += 1) {
    sumOfSquares += amplitudes[n * carrier] ** 2;
  }
  return Math.sqrt(sumOfSquares) / amplitudes[carrier];
}
