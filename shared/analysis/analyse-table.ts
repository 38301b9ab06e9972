import type { Report, TableSettings } from '../contract/index.ts';
import { levelsOf, lsbOf, tableBytesOf, valuesOf, type QuantisedCycle } from '../quantiser/index.ts';
import type { LevelledCycle } from '../waveform/index.ts';
import { carrierFigures } from './carrier-figures.ts';
import { momentsOf } from './moments.ts';
import { spectrumOf, type Spectrum } from './spectrum.ts';
import { toggleFigures } from './toggles.ts';

export interface TableAnalysis {
  readonly report: Report;
  readonly spectrum: Spectrum;
  /** What the codes stand for, q, in signal units (§3.5). */
  readonly values: Float64Array;
}

/** Error power up to which the codes count as exact. */
const exactPower = 1e-24;

/** Figures and spectra of a table against the levelled cycle it stands for (§4). */
export function analyseTable(
  { cycle, clippedSamples }: Pick<LevelledCycle, 'cycle' | 'clippedSamples'>,
  { codes, clippedCodes }: Pick<QuantisedCycle, 'codes' | 'clippedCodes'>,
  table: TableSettings,
): TableAnalysis {
  const lsb = lsbOf(table);
  const values = valuesOf(codes, table);
  const { wanted, result, error } = momentsOf(cycle, values);
  const exact = error.variance <= exactPower;
  // A constant's variance is rounding noise, that of a very small signal may come out as 0.
  const isConstant = wanted.variance === 0 || cycle.every((r) => r === cycle[0]);
  const spectrum = spectrumOf(cycle, values, { cyclePeak: wanted.peak, errorPeak: error.peak });
  const storedCount = table.fold === 'quarter' ? codes.length / 4 : codes.length;

  const report: Report = {
    snrDb: exact || isConstant ? null : 10 * Math.log10(wanted.variance / error.variance),
    idealSnrDb: 6.02 * table.bits + 1.76,
    exact,
    meanErrorLsb: error.mean / lsb,
    rmsErrorLsb: error.rms / lsb,
    peakErrorLsb: error.peak / lsb,
    mean: result.mean,
    rms: result.rms,
    crestFactor: result.rms === 0 ? null : result.peak / result.rms,
    ...codeFigures(codes, table.bits),
    clippedSamples,
    clippedCodes,
    ...carrierFigures(spectrum.amplitudes, table),
    unwantedDb: exact || isConstant ? null : unwantedDbOf(spectrum),
    tableBytes: tableBytesOf(storedCount, table.bits),
    ...toggleFigures(codes),
  };
  return { report, spectrum, values };
}

function codeFigures(codes: Uint16Array, bits: number): Pick<Report, 'minCode' | 'maxCode' | 'usedCodes'> {
  const used = new Uint8Array(levelsOf(bits));
  let minCode = codes[0];
  let maxCode = codes[0];
  let usedCodes = 0;
  for (let k = 0; k < codes.length; k += 1) {
    const code = codes[k];
    if (code < minCode) minCode = code;
    if (code > maxCode) maxCode = code;
    usedCodes += 1 - used[code];
    used[code] = 1;
  }
  return { minCode, maxCode, usedCodes };
}

/** The strongest line that quantising added, against the strongest intended one; DC left out. */
function unwantedDbOf({ intended, added }: Spectrum): number | null {
  let strongestAdded = 0;
  let strongestIntended = 0;
  for (let k = 1; k < intended.length; k += 1) {
    if (added[k] > strongestAdded) strongestAdded = added[k];
    if (intended[k] > strongestIntended) strongestIntended = intended[k];
  }
  const ratio = strongestAdded / strongestIntended;
  return ratio > 0 && Number.isFinite(ratio) ? 20 * Math.log10(ratio) : null;
}
