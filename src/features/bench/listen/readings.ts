import { useEffect, useState } from 'react';
import { spectrumBins } from '../../../audio/spectrum.ts';
import type { MeterReading } from '../../../audio/index.ts';
import { createLive, type Live } from '../../../live/index.ts';
import { useListenControls, useListening } from './listening.tsx';

/** Ten times a second; once where the visitor wants little motion. In milliseconds. */
const everyMs = 100;
const calmMs = 1_000;
/** The lines are for reading, in readings. */
const linesEvery = 3;

/** What is heard, bin by bin. The same arrays with each reading, in a new object. */
export interface HeardSpectrum {
  /** In dBFS: a sine's peak bin reads its amplitude. */
  readonly levelsDb: Float32Array<ArrayBuffer>;
  readonly binHz: number;
}

export interface Readings {
  readonly level: Live<MeterReading | null>;
  readonly lines: Live<MeterReading['lines']>;
  readonly spectrum: Live<HeardSpectrum | null>;
}

const noLines: MeterReading['lines'] = [];

/** Meters read while it plays; nothing is rendered for them but what follows them. */
export function useReadings(): Readings {
  const { preview, status } = useListening();
  const { isInSight } = useListenControls();
  const [made] = useState(() => ({
    level: createLive<MeterReading | null>(null),
    lines: createLive(noLines),
    spectrum: createLive<HeardSpectrum | null>(null),
    levelsDb: new Float32Array(spectrumBins),
  }));
  const isPlaying = status === 'playing';
  useEffect(() => {
    if (!isPlaying || !isInSight || preview === null) return;
    const { level, lines, spectrum, levelsDb } = made;
    const isCalm = matchMedia('(prefers-reduced-motion: reduce)').matches;
    let count = 0;
    const read = () => {
      if (document.hidden) return;
      const reading = preview.meter();
      level.set(reading);
      const found = reading?.lines ?? noLines;
      if ((isCalm || count % linesEvery === 0) && !readTheSame(found, lines.now())) lines.set(found);
      count += 1;
      const binHz = preview.spectrum(levelsDb);
      spectrum.set(binHz === null ? null : { levelsDb, binHz });
    };
    const timer = setInterval(read, isCalm ? calmMs : everyMs);
    return () => {
      clearInterval(timer);
      level.set(null);
      lines.set(noLines);
      spectrum.set(null);
    };
  }, [isPlaying, isInSight, preview, made]);
  return made;
}

/** Whether two readings differ by less than the last digit that is shown. */
function readTheSame(some: MeterReading['lines'], others: MeterReading['lines']): boolean {
  return (
    some.length === others.length &&
    some.every(({ hz, amplitude }, rank) => {
      const other = others[rank];
      return Math.abs(hz / other.hz - 1) < 1e-4 && Math.abs(amplitude / other.amplitude - 1) < 1e-3;
    })
  );
}
