import type { Report, TableSettings } from '../contract/index.ts';
import { realTransformOf } from '../dft/index.ts';
import { levelsOf, lsbOf, tableBytesOf, valuesOf, type QuantisedCycle } from '../quantiser/index.ts';
import type { LevelledCycle } from '../waveform/index.ts';
import { againstSignal, isConstant, strongestOf } from './against-signal.ts';
import { carrierFigures } from './carrier-figures.ts';
import { peakOf, spreadOf } from './moments.ts';
import { spectrumOf, type Spectrum } from './spectrum.ts';
import { toggleFigures } from './toggles.ts';

export interface TableAnalysis {
  readonly report: Report;
  readonly spectrum: Spectrum;
  /** What the codes stand for, q, in signal units (§3.5). */
  readonly values: Float64Array;
}

/** Figures and spectra of a table against the levelled cycle it stands for (§4). */
export function analyseTable(
  { cycle, clippedSamples }: Pick<LevelledCycle, 'cycle' | 'clippedSamples'>,
  { codes, clippedCodes }: Pick<QuantisedCycle, 'codes' | 'clippedCodes'>,
  table: TableSettings,
): TableAnalysis {
  const lsb = lsbOf(table);
  const values = valuesOf(codes, table);
  const errorSignal = errorOf(values, cycle);
  const wanted = spreadOf(cycle);
  const result = spreadOf(values);
  const error = spreadOf(errorSignal);
  const spectrum = spectrumOf(cycle, errorSignal);
  const signal = {
    variance: wanted.variance,
    isConstant: isConstant(cycle, wanted.variance),
    strongest: strongestOf(spectrum.intended),
  };
  const storedCount = table.fold === 'quarter' ? codes.length / 4 : codes.length;

  const { exact, snrDb, unwantedDb } = againstSignal(signal, error.variance, strongestOf(spectrum.added));
  const report: Report = {
    snrDb,
    idealSnrDb: 6.02 * table.bits + 1.76,
    exact,
    meanErrorLsb: error.mean / lsb,
    rmsErrorLsb: error.rms / lsb,
    peakErrorLsb: peakOf(errorSignal) / lsb,
    mean: result.mean,
    rms: result.rms,
    crestFactor: result.rms === 0 ? null : peakOf(values) / result.rms,
    ...codeFigures(codes, table.bits),
    clippedSamples,
    clippedCodes,
    ...carrierFigures(spectrum.amplitudes, table),
    unwantedDb,
    tableBytes: tableBytesOf(storedCount, table.bits),
    ...toggleFigures(codes),
  };
  return { report, spectrum, values };
}

/** The error `q − r`, in the working memory of its transform: it is not given away. */
function errorOf(values: Float64Array, cycle: Float64Array): Float64Array {
  const error = realTransformOf(cycle.length).signal;
  for (let k = 0; k < cycle.length; k += 1) error[k] = values[k] - cycle[k];
  return error;
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
