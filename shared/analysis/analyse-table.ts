import type { Report, TableSettings } from '../contract/index.ts';
import { levelsOf, lsbOf, tableBytesOf, valuesOf, type QuantisedCycle } from '../quantiser/index.ts';
import type { LevelledCycle } from '../waveform/index.ts';
import { carrierFigures } from './carrier-figures.ts';
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
  const wanted = momentsOf(cycle);
  const errors = momentsOf(values, cycle);
  const result = momentsOf(values);
  const exact = errors.variance <= exactPower;
  // A constant's variance is rounding noise, that of a very small signal may come out as 0.
  const isConstant = wanted.peakToPeak === 0 || wanted.variance === 0;
  const spectrum = spectrumOf(cycle, values, lsb);
  const storedCount = table.fold === 'quarter' ? codes.length / 4 : codes.length;

  const report: Report = {
    snrDb: exact || isConstant ? null : 10 * Math.log10(wanted.variance / errors.variance),
    idealSnrDb: 6.02 * table.bits + 1.76,
    exact,
    meanErrorLsb: errors.mean / lsb,
    rmsErrorLsb: errors.rms / lsb,
    peakErrorLsb: errors.peak / lsb,
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

interface Moments {
  readonly mean: number;
  /** Population variance, mean removed. */
  readonly variance: number;
  readonly rms: number;
  /** Largest absolute value. */
  readonly peak: number;
  readonly peakToPeak: number;
}

/** Moments of a signal, or of what is left of it when another is taken off. */
function momentsOf(signal: Float64Array, without?: Float64Array): Moments {
  const count = signal.length;
  let sum = 0;
  let lowest = Infinity;
  let highest = -Infinity;
  for (let k = 0; k < count; k += 1) {
    const value = without === undefined ? signal[k] : signal[k] - without[k];
    sum += value;
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
  }
  const mean = sum / count;
  let squaresAroundMean = 0;
  for (let k = 0; k < count; k += 1) {
    const value = without === undefined ? signal[k] : signal[k] - without[k];
    squaresAroundMean += (value - mean) ** 2;
  }
  const variance = squaresAroundMean / count;
  return {
    mean,
    variance,
    rms: Math.sqrt(variance + mean * mean),
    peak: Math.max(-lowest, highest),
    peakToPeak: highest - lowest,
  };
}

function codeFigures(codes: Uint16Array, bits: number): Pick<Report, 'minCode' | 'maxCode' | 'usedCodes'> {
  const used = new Uint8Array(levelsOf(bits));
  for (let k = 0; k < codes.length; k += 1) used[codes[k]] = 1;
  let usedCodes = 0;
  for (let code = 0; code < used.length; code += 1) usedCodes += used[code];
  return { minCode: used.indexOf(1), maxCode: used.lastIndexOf(1), usedCodes };
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
