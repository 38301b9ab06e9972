import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { sampleRateOfTone, toneOfSampleRate } from '../../../audio/index.ts';
import { ChoiceField, NumberField } from '../../../components/index.ts';
import { driveOf, toneOfDrive, whyNoAccumulator } from './drive.ts';
import type { Playback } from './playback.ts';

interface Lengths {
  /** N, in entries. */
  readonly length: number;
  /** K, cycles of the wave in the table. */
  readonly cycles: number;
}

interface PlaybackFieldsProps {
  playback: Playback;
  onChange: (next: Playback) => void;
  table: Lengths;
}

const highestRateHz = 100e6;
const lowestHz = 0.001;

/** Round and round, by an accumulator or once through, and how fast: tone or sample rate is set, the other follows. */
export function PlaybackFields({ playback, onChange, table: { length, cycles } }: PlaybackFieldsProps) {
  const table = { tableLength: length, tableCycles: cycles };
  const isByTone = playback.by === 'tone';
  const { kind } = driveOf(playback, { length, cycles });
  const isLoop = kind === 'loop';
  const toneHz = isByTone ? playback.toneHz : shown(toneOfSampleRate(playback.sampleRateHz, table));
  const sampleRateHz = isByTone ? shown(sampleRateOfTone(playback.toneHz, table)) : playback.sampleRateHz;
  const whyNot = playback.accumulator === undefined ? null : whyNoAccumulator(playback, length);
  return (
    <>
      <ChoiceField
        label="Played"
        value={kind}
        options={[
          { value: 'loop', label: 'As a loop' },
          ...(playback.accumulator === undefined
            ? []
            : [
                {
                  value: 'accumulator' as const,
                  label: 'By the phase accumulator',
                  isDisabled: whyNot !== null,
                },
              ]),
          { value: 'once', label: 'Once through' },
        ]}
        description={
          <>
            {hintOf(playback, { length, cycles }, sampleRateHz)}
            {whyNot !== null && <> Not by the phase accumulator: {whyNot}.</>}
          </>
        }
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
              isByTone ? toneHint(toneHz) : `K·fs/N = ${cycles} · fs/${length}, from the sample rate`
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
              ? `tone·N/K = tone · ${length}/${cycles}, from the tone`
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

function hintOf(playback: Playback, table: Lengths, sampleRateHz: number): string {
  const drive = driveOf(playback, table);
  switch (drive.kind) {
    case 'loop':
      return 'The table goes round and round, as a tone does.';
    case 'accumulator':
      return `Step word ${drive.stepWord} of ${drive.accumulatorBits} bits at this sample rate gives ${formatQuantity(toneOfDrive(drive, table), 'Hz', { significant: 6 })}.`;
    case 'once':
      return passHint(table.length / sampleRateHz);
  }
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
