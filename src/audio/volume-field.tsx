import { useId } from 'react';
import { formatQuantity } from '../../shared/quantities/index.ts';
import { loudestDbfs, volumeRangeDb } from './index.ts';

/** Volume in dB below the loudest that the preview plays. It starts quiet with every visit. */
export function VolumeField({ value, onChange }: { value: number; onChange: (db: number) => void }) {
  const id = useId();
  const words = `${formatQuantity(value, 'dB', { decimals: 0 })}, full scale peaks at ${formatQuantity(loudestDbfs + value, 'dBFS', { decimals: 0 })}`;
  return (
    <div className="field">
      <div className="field-head">
        <label htmlFor={id}>Volume</label>
      </div>
      <input
        id={id}
        type="range"
        className="volume"
        min={volumeRangeDb.min}
        max={volumeRangeDb.max}
        step={1}
        value={value}
        aria-valuetext={words}
        onChange={(event) => onChange(Number(event.target.value))}
      />
      <p className="field-description">{words}</p>
    </div>
  );
}
