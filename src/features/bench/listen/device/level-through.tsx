import { useEffect, useState } from 'react';
import { gainOf, type ResponsePoint } from '../../../../../shared/listening/device-response.ts';
import { predictedLines } from '../../../../../shared/listening/predicted-lines.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { Explain } from '../../../../components/index.ts';
import { useListening } from '../listening.tsx';

/** Until a context is open its rate is not known; this is the usual one. */
const usualContextRateHz = 48_000;
const pauseMs = 150;
const mostLines = 1_000;

/** What a curve leaves of the level of what is heard. */
export function LevelThrough({ points }: { points: readonly ResponsePoint[] }) {
  const { sounding, preview } = useListening();
  const { sound, hearing } = sounding;
  const rateHz = preview?.contextRateHz ?? usualContextRateHz;
  const [db, setDb] = useState<number | null>(null);
  useEffect(() => {
    const timer = setTimeout(() => {
      const gain = gainOf(points);
      let straight = 0;
      let through = 0;
      for (const { hz, amplitude } of predictedLines(sound.voices[hearing], sound.drive, rateHz, mostLines)) {
        straight += amplitude ** 2;
        through += (amplitude * gain(hz)) ** 2;
      }
      setDb(straight > 0 ? 10 * Math.log10(through / straight) : null);
    }, pauseMs);
    return () => clearTimeout(timer);
  }, [points, sound, hearing, rateHz]);
  if (db === null) return null;
  return (
    <p className="curve-level">
      Level of this sound through it: <strong>{formatQuantity(db, 'dB', { decimals: 1 })}</strong>
      <Explain title="Level of this sound through it">
        <p>
          <code>10·log10(Σ(g·A)²/Σ A²)</code> over the lines A that are predicted for what is heard, g being
          the curve’s gain at each: the RMS level against the straight one.
        </p>
        <p>
          Near 0 dB the wave’s strength lies where the device is strong. Far below, other partials or another
          tone would be louder from the same supply.
        </p>
      </Explain>
    </p>
  );
}
