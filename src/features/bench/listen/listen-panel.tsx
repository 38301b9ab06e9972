import { useMemo, useRef, useState } from 'react';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { sampleRateOfTone, volumeRangeDb, type Hearing, type Sound } from '../../../audio/index.ts';
import { Button, Caution, ChoiceField, Explain, icons } from '../../../components/index.ts';
import { FieldProblem } from '../../../components/field-frame.tsx';
import { Meter } from './meter.tsx';
import { PlaybackFields } from './playback-fields.tsx';
import type { Playback } from './playback.ts';
import { PlayingFlag } from './playing-flag.tsx';
import { useBeyond } from './use-beyond.ts';
import { usePlayKey } from './use-play-key.ts';
import { usePreview } from '../../../audio/use-preview.ts';
import { VolumeField } from '../../../audio/volume-field.tsx';
import './listen.css';

export interface ListenPanelProps {
  /** The levelled cycle, one value an entry. */
  cycle: Float64Array;
  /** What the codes stand for, in the units of `cycle`. */
  values: Float64Array;
  playback: Playback;
  onPlaybackChange: (next: Playback) => void;
  range: 'bipolar' | 'unipolar';
  /** Cycles of the wave in the table, K. */
  tableCycles: number;
}

/** Plays the wave before and after it was quantised. It starts with a press only, quietly, and shows how to stop. */
export function ListenPanel({
  cycle,
  values,
  playback,
  onPlaybackChange,
  range,
  tableCycles,
}: ListenPanelProps) {
  const panel = useRef<HTMLElement>(null);
  const [hearing, setHearing] = useState<Hearing>('table');
  const [volumeDb, setVolumeDb] = useState<number>(volumeRangeDb.start);
  const table = { tableLength: values.length, tableCycles };
  const sampleRateHz =
    playback.by === 'tone' ? sampleRateOfTone(playback.toneHz, table) : playback.sampleRateHz;
  const { mode } = playback;
  const sound = useMemo<Sound>(
    () => ({ cycle, values, range, mode, sampleRateHz }),
    [cycle, values, range, mode, sampleRateHz],
  );
  const { status, trouble, toggle, preview } = usePreview(sound, hearing, volumeDb);
  const beyond = useBeyond(sound, preview?.contextRateHz);
  usePlayKey(toggle);
  const isOn = status !== 'silent';

  return (
    <section ref={panel} className="listen space-y-4" aria-labelledby="listen-title">
      <h3 id="listen-title" className="flex items-center gap-2">
        Listen
        <Explain title="Listen">
          <p>
            Plays the wave as it sounds behind an ideal low-pass filter at half of the sample rate: its lines{' '}
            <code>m·fs/N</code> up to there, without the images that the pin’s steps add.
          </p>
          <p>
            Ideal curve: the wave before it was quantised. Quantised table: what the codes stand for. You can
            change over while it plays. The mean is taken out.
          </p>
        </Explain>
      </h3>
      <div className="listen-controls">
        <Button variant="primary" icon={isOn ? icons.stop : icons.play} onPress={toggle}>
          {isOn ? 'Stop' : 'Play'}
        </Button>
        <ChoiceField
          label="Heard"
          hideLabel
          value={hearing}
          options={[
            { value: 'ideal', label: 'Ideal curve' },
            { value: 'table', label: 'Quantised table' },
          ]}
          onChange={setHearing}
        />
      </div>
      <div role="status">
        {status === 'starting' && <p className="field-description">Starting…</p>}
        {status === 'playing' && <p className="field-description">{sayPlaying(hearing, mode)}</p>}
        {trouble !== null && <FieldProblem id="listen-trouble">{trouble}</FieldProblem>}
      </div>
      <Meter preview={preview} isPlaying={status === 'playing'} />
      <VolumeField value={volumeDb} onChange={setVolumeDb} />
      <PlaybackFields playback={playback} onChange={onPlaybackChange} table={table} />
      {beyond !== null && (
        <p className="field-description">
          {beyond.count === 1 ? 'One line lies' : `${beyond.count} lines lie`} above{' '}
          {formatQuantity(beyond.limitHz, 'Hz', { significant: 4 })}, half of the rate at which this browser
          plays, and {beyond.count === 1 ? 'is' : 'are'} not played.
        </p>
      )}
      {range === 'unipolar' && (
        <p className="field-description">
          This table is unipolar, as for a lamp’s duty. What is played is its swing about its mean, scaled so
          that the whole of 0…1 is as loud as −1…1 of a bipolar table; a slow fade makes no sound of its own.
        </p>
      )}
      <Caution title="Mind your hearing">
        Take headphones off, or turn the device down, before you press play; then raise the volume slowly.
        Whether a warning or alarm tone is fit for its use is for the standard that applies and a qualified
        engineer to say, not for this preview.
      </Caution>
      {status === 'playing' && <PlayingFlag panel={panel} onStop={toggle} />}
    </section>
  );
}

function sayPlaying(hearing: Hearing, mode: Sound['mode']): string {
  const what = hearing === 'ideal' ? 'the ideal curve' : 'the quantised table';
  return mode === 'loop' ? `Playing ${what} as a loop.` : `Playing ${what} once through.`;
}
