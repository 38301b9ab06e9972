import { meterFrames } from './graph.ts';

/** Bins of the live spectrum, from 0 Hz on. */
export const spectrumBins = meterFrames / 2;

/** Amplitude of a sine over its peak bin: the mean of the Blackman window is 0.42, and half lies at −f. */
const amplitudeDb = 20 * Math.log10(2 / 0.42);

/** @returns a reader that fills bins in dBFS and answers the width of a bin in hertz */
export function createSpectrum(analyser: AnalyserNode): (levelsDb: Float32Array) => number {
  const bins = new Float32Array(analyser.frequencyBinCount);
  return (levelsDb) => {
    analyser.getFloatFrequencyData(bins);
    const count = Math.min(bins.length, levelsDb.length);
    for (let k = 0; k < count; k += 1) levelsDb[k] = bins[k] + amplitudeDb;
    return analyser.context.sampleRate / analyser.fftSize;
  };
}
