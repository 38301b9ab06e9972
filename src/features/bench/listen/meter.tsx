import { useEffect, useRef } from 'react';
import { levelCapDbfs } from '../../../audio/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Explain } from '../../../components/index.ts';
import { useLive } from '../../../live/index.ts';
import { LiveSpectrum } from './live-spectrum.tsx';
import { useListening } from './listening.tsx';
import { useReadings, type Readings } from './readings.ts';

/** What sounds, read while it does: level, spectrum, and the five strongest lines. */
export function Meter() {
  const readings = useReadings();
  const { status } = useListening();
  return (
    <>
      <LevelMeter level={readings.level} />
      <LiveSpectrum spectrum={readings.spectrum} />
      {status === 'playing' && <StrongestLines lines={readings.lines} />}
    </>
  );
}

/** The bar's left end, in dBFS; its right end is 0. */
const lowestDb = -72;
const shareOf = (db: number) => Math.min(1, Math.max(0, 1 - db / lowestDb));
const dbfs = (level: number) => formatQuantity(level, 'dBFS', { decimals: 1 });

/** Writing the same again would have the browser lay the line out again. */
function write(element: HTMLElement, words: string): void {
  if (element.textContent !== words) element.textContent = words;
}

/** Level on a bar from −72 to 0 dBFS. Written straight into the page ten times a second. */
function LevelMeter({ level }: { level: Readings['level'] }) {
  const bar = useRef<HTMLDivElement>(null);
  const rms = useRef<HTMLSpanElement>(null);
  const peak = useRef<HTMLSpanElement>(null);
  useEffect(() => {
    const show = () => {
      const reading = level.now();
      if (bar.current === null || rms.current === null || peak.current === null) return;
      const isHeard = reading !== null && Number.isFinite(reading.rmsDbfs);
      bar.current.style.setProperty('--rms', isHeard ? shareOf(reading.rmsDbfs).toFixed(3) : '0');
      bar.current.style.setProperty('--peak', isHeard ? shareOf(reading.peakDbfs).toFixed(3) : '0');
      bar.current.toggleAttribute('data-silent', !isHeard);
      write(rms.current, isHeard ? dbfs(reading.rmsDbfs) : '–');
      write(peak.current, isHeard ? dbfs(reading.peakDbfs) : '–');
    };
    show();
    return level.subscribe(show);
  }, [level]);
  return (
    <div className="meter">
      <p className="meter-level">
        Level{' '}
        <span ref={rms} className="meter-figure">
          –
        </span>{' '}
        RMS ·{' '}
        <span ref={peak} className="meter-figure">
          –
        </span>{' '}
        peak
        <Explain title="Level">
          <p>
            Over the last third of a second, as it leaves this browser: 0 dBFS is the peak of a sine that
            fills it, and that sine has −3.0 dBFS RMS.
          </p>
          <p>
            Every sample is held to {dbfs(levelCapDbfs)}, marked “cap”. A peak that comes near it is too loud
            for listening closely.
          </p>
        </Explain>
      </p>
      <div ref={bar} className="level-bar" aria-hidden="true" data-silent="">
        <span className="level-rms" />
        <span className="level-peak" />
        <span className="level-cap" style={{ left: `${100 * shareOf(levelCapDbfs)}%` }} />
      </div>
      <div className="level-scale" aria-hidden="true">
        {[-72, -48, -24].map((tick) => (
          <span key={tick} style={{ left: `${100 * shareOf(tick)}%` }}>
            {String(tick).replace('-', '−')}
          </span>
        ))}
        <span style={{ left: `${100 * shareOf(levelCapDbfs)}%` }} className="level-cap-name">
          cap
        </span>
      </div>
    </div>
  );
}

function StrongestLines({ lines: live }: { lines: Readings['lines'] }) {
  const lines = useLive(live);
  const strongest = lines[0]?.amplitude ?? 1;
  return (
    <table className="meter-lines">
      <caption>
        Strongest lines as played
        <Explain title="Strongest lines as played">
          <p>
            Sines found in what this browser plays, over the last third of a second: frequency, and level
            relative to the strongest. Lines closer than 18 Hz, and lines more than 55 dB below the strongest,
            are not told apart.
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
  );
}
