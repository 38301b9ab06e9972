import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { sampleRateOfTone, toneOfSampleRate, type TableShape } from '../../../audio/index.ts';
import { ChoiceField, NumberField } from '../../../components/index.ts';
import type { Playback } from './playback.ts';

interface PlaybackFieldsProps {
  playback: Playback;
  onChange: (next: Playback) => void;
  table: TableShape;
}

const highestRateHz = 100e6;
const lowestHz = 0.001;

/** Loop or once through, and how fast: the tone or the sample rate is set, and the other follows. */
export function PlaybackFields({ playback, onChange, table }: PlaybackFieldsProps) {
  const isByTone = playback.by === 'tone';
  const isLoop = playback.mode === 'loop';
  const toneHz = isByTone ? playback.toneHz : shown(toneOfSampleRate(playback.sampleRateHz, table));
  const sampleRateHz = isByTone ? shown(sampleRateOfTone(playback.toneHz, table)) : playback.sampleRateHz;
  const { tableLength, tableCycles } = table;
  return (
    <>
      <ChoiceField
        label="Played"
        value={playback.mode}
        options={[
          { value: 'loop', label: 'As a loop', hint: 'The table goes round and round, as a tone does.' },
          { value: 'once', label: 'Once through', hint: passHint(tableLength / sampleRateHz) },
        ]}
        onChange={(mode) => onChange({ ...playback, mode })}
      />
      <div className="field-pair">
        {isLoop && (
          <NumberField
            label="Tone"
            unit="Hz"
            min={lowestHz}
            allowed="a number of hertz, 0.001 or more"
            description={
              isByTone
                ? toneHint(toneHz)
                : `K·fs/N = ${tableCycles} · fs/${tableLength}, from the sample rate`
            }
            value={toneHz}
            onChange={(next) => onChange({ ...playback, by: 'tone', toneHz: next, sampleRateHz })}
          />
        )}
        <NumberField
          label="Sample rate"
          unit="Hz"
          min={lowestHz}
          max={highestRateHz}
          step={100}
          allowed="a number of hertz from 0.001 to 100 MHz"
          description={
            isByTone && isLoop
              ? `tone·N/K = tone · ${tableLength}/${tableCycles}, from the tone`
              : isLoop
                ? 'Entries a second; set here, and the tone follows.'
                : 'Entries a second.'
          }
          value={sampleRateHz}
          onChange={(next) => onChange({ ...playback, by: 'sampleRate', sampleRateHz: next, toneHz })}
        />
      </div>
    </>
  );
}

/** What follows from the other field, without the digits that nobody set. */
function shown(hz: number): number {
  return Number(hz.toPrecision(7));
}

function passHint(seconds: number): string {
  return Number.isFinite(seconds)
    ? `One pass lasts ${formatQuantity(seconds, 's', { significant: 3 })}.`
    : 'One pass.';
}

function toneHint(toneHz: number): string {
  return toneHz < 20
    ? 'Below hearing: only its higher harmonics can be heard.'
    : 'Set here; the sample rate follows.';
}
