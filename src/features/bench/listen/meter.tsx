import { useEffect, useState } from 'react';
import type { AudioPreview, MeterReading } from '../../../audio/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Explain } from '../../../components/index.ts';

const everyMs = 250;

/** What sounds, read four times a second while it does: level, and the five strongest lines. Quiet for screen readers. */
export function Meter({ preview, isPlaying }: { preview: AudioPreview | null; isPlaying: boolean }) {
  const [reading, setReading] = useState<MeterReading | null>(null);
  useEffect(() => {
    if (!isPlaying || preview === null) return;
    const timer = setInterval(() => setReading(preview.meter()), everyMs);
    return () => {
      clearInterval(timer);
      setReading(null);
    };
  }, [isPlaying, preview]);

  if (!isPlaying) return null;
  const lines = reading?.lines ?? [];
  const strongest = lines[0]?.amplitude ?? 1;
  return (
    <div className="meter">
      <p className="meter-level">
        Level <Level value={reading?.rmsDbfs} /> RMS · <Level value={reading?.peakDbfs} /> peak
      </p>
      <table className="meter-lines">
        <caption>
          Strongest lines as played
          <Explain title="Strongest lines as played">
            <p>
              Sines found in what this browser plays, over the last third of a second: frequency, and level
              relative to the strongest. Lines closer than 18 Hz, and lines more than 55 dB below the
              strongest, are not told apart.
            </p>
          </Explain>
        </caption>
        <thead className="sr-only">
          <tr>
            <th scope="col">Frequency</th>
            <th scope="col">Level relative to the strongest</th>
          </tr>
        </thead>
        <tbody>
          {lines.map(({ hz, amplitude }, rank) => {
            const db = 20 * Math.log10(amplitude / strongest);
            return (
              <tr key={rank}>
                <td>{formatQuantity(hz, 'Hz', { significant: 4 })}</td>
                <td>{formatQuantity(db, 'dB', { decimals: 1 })}</td>
                <td aria-hidden="true">
                  <span className="meter-bar" style={{ width: `${Math.max(2, 100 + db * (100 / 55))}%` }} />
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

function Level({ value }: { value: number | undefined }) {
  return (
    <span className="meter-figure">
      {value === undefined ? '–' : formatQuantity(value, 'dBFS', { decimals: 1 })}
    </span>
  );
}
