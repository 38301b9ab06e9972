import { dbOfGain } from './levels.ts';
import { strongestLines, type SoundingLine } from './strongest-lines.ts';

export interface MeterReading {
  /** Level over the meter's window in dBFS; an amplitude-1 sine peaks at 0 and has −3.01 RMS. */
  readonly rmsDbfs: number;
  readonly peakDbfs: number;
  /** The five strongest lines, strongest first. */
  readonly lines: readonly SoundingLine[];
}

const linesShown = 5;

/** A reader of the analyser that keeps its own arrays, so that reading four times a second leaves no litter. */
export function createMeter(analyser: AnalyserNode): () => MeterReading {
  const wave = new Float32Array(analyser.fftSize);
  const levelsDb = new Float32Array(analyser.frequencyBinCount);
  const power = new Float64Array(analyser.frequencyBinCount);
  return () => {
    analyser.getFloatTimeDomainData(wave);
    let peak = 0;
    let sum = 0;
    for (const sample of wave) {
      peak = Math.max(peak, Math.abs(sample));
      sum += sample * sample;
    }
    analyser.getFloatFrequencyData(levelsDb);
    return {
      rmsDbfs: dbOfGain(Math.sqrt(sum / wave.length)),
      peakDbfs: dbOfGain(peak),
      lines: strongestLines(levelsDb, analyser.context.sampleRate / analyser.fftSize, linesShown, power),
    };
  };
}
