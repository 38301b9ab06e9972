import type { Report, TableSettings } from '../contract/index.ts';
import { realTransformOf } from '../dft/index.ts';
import { levelsOf, lsbOf, tableBytesOf, valuesOf, type QuantisedCycle } from '../quantiser/index.ts';
import type { LevelledCycle } from '../waveform/index.ts';
import { againstSignal, isConstant, strongestOf } from './against-signal.ts';
import { carrierFigures } from './carrier-figures.ts';
import { spreadOf } from './moments.ts';
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
  const { error, errorPeak, valuePeak } = errorOf(values, cycle);
  const spreads = { wanted: spreadOf(cycle), result: spreadOf(values), error: spreadOf(error) };
  const spectrum = spectrumOf(cycle, error);
  const signal = {
    variance: spreads.wanted.variance,
    isConstant: isConstant(cycle, spreads.wanted.variance),
    strongest: strongestOf(spectrum.intended),
  };
  const storedCount = table.fold === 'quarter' ? codes.length / 4 : codes.length;

  const { exact, snrDb, unwantedDb } = againstSignal(
    signal,
    spreads.error.variance,
    strongestOf(spectrum.added),
  );
  const report: Report = {
    snrDb,
    idealSnrDb: 6.02 * table.bits + 1.76,
    exact,
    meanErrorLsb: spreads.error.mean / lsb,
    rmsErrorLsb: spreads.error.rms / lsb,
    peakErrorLsb: errorPeak / lsb,
    mean: spreads.result.mean,
    rms: spreads.result.rms,
    crestFactor: spreads.result.rms === 0 ? null : valuePeak / spreads.result.rms,
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

/**
 * The error `q − r` and the largest absolute values of both q and e. The error lies in the working memory of its
 * transform: it is not given away.
 */
function errorOf(
  values: Float64Array,
  cycle: Float64Array,
): { error: Float64Array; errorPeak: number; valuePeak: number } {
  const error = realTransformOf(cycle.length).signal;
  let errorPeak = 0;
  let valuePeak = 0;
  for (let k = 0; k < cycle.length; k += 1) {
    const q = values[k];
    const e = q - cycle[k];
    error[k] = e;
    if (Math.abs(e) > errorPeak) errorPeak = Math.abs(e);
    if (Math.abs(q) > valuePeak) valuePeak = Math.abs(q);
  }
  return { error, errorPeak, valuePeak };
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
