import type { Report } from '../../../../shared/contract/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { fixed, significant } from '../numbers.ts';
import { lowBandNoise } from './low-band.ts';
import type { ShownFigure } from './shown-figure.ts';

export interface FigureGroup {
  readonly title: string;
  /** A word about the whole group. */
  readonly note?: string;
  readonly figures: readonly ShownFigure[];
}

/** A line counts as one of the wave's own above this share of its strongest. */
const ownLineShare = 1e-4;

/** How many lines the levelled wave has of its own, DC apart. */
export function countOwnLines(intended: Float64Array): number {
  let strongest = 0;
  for (let k = 1; k < intended.length; k += 1) if (intended[k] > strongest) strongest = intended[k];
  let lines = 0;
  for (let k = 1; k < intended.length; k += 1) if (intended[k] > ownLineShare * strongest) lines += 1;
  return lines;
}

export function figureGroupsOf(table: TableAnswer): FigureGroup[] {
  const { report, definition, spectrum } = table;
  const lines = countOwnLines(spectrum.intended);
  const several = lines > 1;
  return [
    {
      title: 'What quantising added',
      figures: [
        snr(report, lines > 0),
        unwanted(report, lines > 0),
        lowBandNoise(table),
        ...errors(report),
        clipped(report),
      ],
    },
    {
      title: 'Measured as a converter',
      note: several
        ? 'This wave has several partials of its own, and these figures count them as distortion. Judge it by the unwanted line.'
        : undefined,
      figures: [sinad(report, several), enob(report, definition.table.bits), ...distortion(report, several)],
    },
    { title: 'The signal', figures: [...signal(report), usedCodes(report, definition.table.bits)] },
    { title: 'The table', figures: tableFigures(report) },
  ];
}

const noSignal = 'The wave does not move, so there is no signal to measure against.';
const isTheWave =
  'The codes give the wave exactly (but for a constant, if one was added): quantising added nothing to compare with.';
const noCarrier =
  'Either the strongest line lies at half the sample rate, where it cannot be told from its image, or there is nothing beside it.';

function snr({ snrDb, idealSnrDb, exact }: Report, moves: boolean): ShownFigure {
  const isExact = exact && moves;
  return {
    id: 'snrDb',
    label: 'SNR',
    value: snrDb === null ? (isExact ? 'exact' : '–') : fixed(snrDb, 1),
    unit: snrDb === null ? undefined : `dB of ${fixed(idealSnrDb, 1)}`,
    tone: isExact || (snrDb !== null && snrDb > idealSnrDb - 1) ? 'good' : undefined,
    meaning: 'Signal-to-noise ratio: how far the wave stands above all that quantising changed in it.',
    formula: '10·log10( var(r) / var(e) ); r the levelled wave, e the error of its codes, means removed',
    good: `A full-scale sine reaches 6.02·b + 1.76 = ${fixed(idealSnrDb, 2)} dB (Bennett 1948). A wave with a high crest factor or a low level lies below that; a wave that happens to fall on codes lies above.`,
    missing: snrDb !== null ? undefined : isExact ? isTheWave : noSignal,
  };
}

function unwanted({ unwantedDb, exact }: Report, moves: boolean): ShownFigure {
  const isExact = exact && moves;
  return {
    id: 'unwantedDb',
    label: 'Unwanted line',
    value: unwantedDb === null ? (isExact ? 'none' : '–') : fixed(unwantedDb, 1),
    unit: unwantedDb === null ? undefined : 'dB',
    meaning:
      'The strongest line that quantising added, against the strongest line of the wave. It is the one most likely to be heard as a tone of its own.',
    formula: '20·log10( max A_k(e) / max A_k(r) ), k ≥ 1; A_k are amplitudes of the spectrum',
    good: 'The lower the better. Waves of several partials are judged by this figure, not by SINAD or THD.',
    missing: unwantedDb !== null ? undefined : isExact ? isTheWave : noSignal,
  };
}

function errors({ peakErrorLsb, rmsErrorLsb, meanErrorLsb }: Report): ShownFigure[] {
  return [
    {
      id: 'peakErrorLsb',
      label: 'Peak error',
      value: significant(peakErrorLsb),
      unit: 'LSB',
      meaning: 'The largest distance of a code’s value from the wave.',
      formula: 'max |e|, in LSB',
      good: 'At most 0.5 LSB when rounding to the nearest code, at most 1 when rounding down. More means that something was clipped.',
      tone: peakErrorLsb > 1 + 1e-6 ? 'attention' : undefined,
    },
    {
      id: 'rmsErrorLsb',
      label: 'RMS error',
      value: significant(rmsErrorLsb),
      unit: 'LSB',
      meaning: 'The size of the error over the whole table.',
      formula: '√( mean of e² ), in LSB',
      good: 'About 1/√12 = 0.289 LSB where the error is spread evenly (Bennett 1948).',
    },
    {
      id: 'meanErrorLsb',
      label: 'Mean error',
      value: significant(meanErrorLsb),
      unit: 'LSB',
      meaning: 'The DC that quantising added.',
      formula: 'mean of e, in LSB',
      good: 'Near 0. Rounding down brings about −0.5 LSB; half to even avoids the bias of ties.',
    },
  ];
}

function sinad({ sinadDb, idealSnrDb }: Report, several: boolean): ShownFigure {
  return {
    id: 'sinadDb',
    label: 'SINAD',
    value: sinadDb === null ? '–' : fixed(sinadDb, 1),
    unit: sinadDb === null ? undefined : 'dB',
    meaning:
      'Signal to noise and distortion: the strongest line’s power over that of all others, DC left out.',
    formula: '10·log10( P_carrier / Σ P_k ), k ≥ 1 without the carrier; P_k = A_k²/2',
    good: several
      ? 'For a wave of several partials it says little: the wave’s own partials count as distortion.'
      : `For a full-scale sine near ${fixed(idealSnrDb, 1)} dB.`,
    missing: sinadDb === null ? noCarrier : undefined,
  };
}

function enob({ enobBits }: Report, bits: number): ShownFigure {
  return {
    id: 'enobBits',
    label: 'ENOB',
    value: enobBits === null ? '–' : fixed(enobBits, 2),
    unit: enobBits === null ? undefined : `bits of ${bits}`,
    meaning: 'Effective number of bits: the depth at which an ideal converter would have this SINAD.',
    formula: '(SINAD − 1.76 + 20·log10(A_full / A_carrier)) / 6.02 (IEEE Std 1658-2011)',
    good: `For a full-scale sine near ${bits}. It is made for single sines.`,
    missing: enobBits === null ? noCarrier : undefined,
  };
}

function distortion({ thdDb, thdPercent, sfdrDb }: Report, several: boolean): ShownFigure[] {
  return [
    {
      id: 'thdDb',
      label: 'THD',
      value: thdDb === null ? '–' : fixed(thdDb, 1),
      unit: thdDb === null || thdPercent === null ? undefined : `dB · ${significant(thdPercent)} %`,
      meaning: 'Total harmonic distortion: harmonics 2 to 10 of the strongest line against it.',
      formula: '20·log10( √(Σ A²) / A_carrier ), harmonics 2…10 that lie below N/2',
      good: several
        ? 'For a wave with harmonics of its own it tells those, not a fault.'
        : 'The lower the better: −60 dB is 0.1 %.',
      missing:
        thdDb === null
          ? 'No harmonic of the carrier below half the sample rate holds anything, or there is no carrier.'
          : undefined,
    },
    {
      id: 'sfdrDb',
      label: 'SFDR',
      value: sfdrDb === null ? '–' : fixed(sfdrDb, 1),
      unit: sfdrDb === null ? undefined : 'dB',
      meaning: 'Spurious-free dynamic range: from the strongest line down to the next.',
      formula: '20·log10( A_carrier / max A_k ), k ≥ 1 without the carrier',
      good: several
        ? 'For a wave of several partials the next line is one of its own.'
        : 'The higher the better.',
      missing: sfdrDb === null ? noCarrier : undefined,
    },
  ];
}

function clipped({ clippedSamples, clippedCodes }: Report): ShownFigure {
  const count = clippedSamples + clippedCodes;
  return {
    id: 'clipped',
    label: 'Clipped',
    value: significant(count, 6),
    unit: clippedCodes === 0 ? 'samples' : `${clippedSamples} samples, ${clippedCodes} codes`,
    tone: count > 0 ? 'attention' : undefined,
    meaning: 'Samples that left the range before quantising, and codes that rounding pushed over the end.',
    formula: 'samples beyond the range by more than 10⁻¹²; codes outside 0…2^b − 1',
    good: '0. Normalise, or lower the level. One code at the top is the price of mid-tread.',
  };
}

function signal({ mean, rms, crestFactor }: Report): ShownFigure[] {
  return [
    {
      id: 'mean',
      label: 'Mean',
      value: significant(mean),
      unit: 'FS',
      meaning: 'The DC of the codes, as a fraction of full scale (FS).',
      formula: 'mean of q, the value of the codes',
      good: 'Near 0 for a loudspeaker behind no capacitor; as meant for a lamp.',
    },
    {
      id: 'rms',
      label: 'RMS',
      value: significant(rms),
      unit: 'FS',
      meaning:
        'The effective value of the codes, mean kept, as a fraction of full scale (FS). It tells how loud or bright the wave is.',
      formula: '√( mean of q² )',
      good: 'A full-scale sine has 0.707, a square wave 1.',
    },
    {
      id: 'crestFactor',
      label: 'Crest factor',
      value: crestFactor === null ? '–' : fixed(crestFactor, 2),
      meaning: 'How far the peak stands above the effective value, mean kept.',
      formula: 'max |q| / rms(q)',
      good: 'Low is loud for the same codes: sine 1.41, square 1. Turning the phases of partials changes it without changing the tone.',
      missing: crestFactor === null ? 'The RMS value is 0.' : undefined,
    },
  ];
}

function usedCodes({ usedCodes: count, minCode, maxCode }: Report, bits: number): ShownFigure {
  return {
    id: 'usedCodes',
    label: 'Codes used',
    value: significant(count, 6),
    unit: `of ${significant(2 ** bits, 6)}`,
    meaning: `Different codes in the table. They run from ${minCode} to ${maxCode}.`,
    formula: 'count of distinct codes',
    good: 'Many, where the table is long enough: unused codes at the ends are depth given away.',
  };
}

function tableFigures({ minCode, maxCode, tableBytes, meanToggles, worstToggle }: Report): ShownFigure[] {
  return [
    {
      id: 'codeRange',
      label: 'Code range',
      value: `${minCode}…${maxCode}`,
      meaning: 'The lowest and the highest code of the table, before complement and coding.',
      formula: 'min and max of c[k]',
      good: 'From end to end for a wave at full level.',
    },
    {
      id: 'tableBytes',
      label: 'Size',
      value: significant(tableBytes, 6),
      unit: 'bytes',
      meaning: 'What the array takes in memory.',
      formula: 'entries stored × bytes of a word: 1 up to 8 bits, else 2',
      good: 'Compare it with the flash of the part it goes into.',
    },
    {
      id: 'meanToggles',
      label: 'Mean toggles',
      value: significant(meanToggles),
      unit: 'bits a step',
      meaning: 'Bits that change from one entry to the next, on average. Each is an edge on a pin.',
      formula: 'mean over the loop of the bits in c[k] ⊕ c[k+1], seam included',
      good: 'Fewer edges are quieter. A ramp by single codes has just under 2.',
    },
    {
      id: 'worstToggle',
      label: 'Worst toggle',
      value: String(worstToggle.bits),
      unit: `${worstToggle.bits === 1 ? 'bit' : 'bits'} after entry ${worstToggle.index}`,
      meaning: `From code ${worstToggle.from} to code ${worstToggle.to}: the step at which the most bits change at once.`,
      formula: 'the largest count of bits in c[k] ⊕ c[k+1], lowest k first',
      good: 'A ladder glitches most where many bits change at once, at the middle above all.',
    },
  ];
}
