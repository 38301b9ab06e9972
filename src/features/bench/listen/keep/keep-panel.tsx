import './keep.css';
import { useMemo, useState } from 'react';
import { fullScaleDbfs } from '../../../../../shared/listening/wav-scale.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import {
  Button,
  ChoiceField,
  Explain,
  NumberField,
  SelectField,
  SwitchField,
  icons,
} from '../../../../components/index.ts';
import { useLive } from '../../../../live/index.ts';
import { useListening, type Given } from '../listening.tsx';
import { canBeRounds, planOf, takesDither, type KeepPlan } from './keep-plan.ts';
import { commonRatesHz, keepLimits, keepSettings, setKeep, type KeepSettings } from './keep-settings.ts';
import { KeptWords } from './kept-words.tsx';
import { useKeep } from './use-keep.ts';

const secretWords =
  'While a blind test is under way no file is made: it would tell which of the two is heard.';

/** What is heard as a WAV file, rendered at the file's own rate. */
export function KeepPanel() {
  const { sounding, owner, device, table } = useListening();
  const settings = useLive(keepSettings);
  const { name } = table.definition;
  const through = settings.isThroughDevice ? device : null;
  // The response is made when the file is: that takes a while.
  const plan = useMemo(() => planOf(sounding, settings, null, name), [sounding, settings, name]);
  const { state, start, stop } = useKeep();
  const isWorking = state.kind === 'working';
  const keep = (part: Partial<KeepSettings> = {}) => {
    if (Object.keys(part).length > 0) setKeep(part);
    start(planOf(sounding, { ...settings, ...part }, through, name));
  };
  return (
    <>
      <p className="field-description">
        {sounding.isSecret === true
          ? secretWords
          : `The file holds ${sayWhat(sounding, owner)}, rendered at its own rate and not through the browser’s player. The volume is left out.`}
      </p>
      <LengthFields settings={settings} given={sounding} plan={plan} />
      <SampleFields settings={settings} />
      <LevelField settings={settings} />
      {device !== null && (
        <SwitchField
          label={`Through “${device.name}”`}
          isOn={settings.isThroughDevice}
          onChange={(isThroughDevice) => setKeep({ isThroughDevice })}
          description="As it is heard now. Off: straight from the pin."
        />
      )}
      <p className="keep-name">
        <code>{plan.fileName}</code> {Math.ceil(plan.bytes / 1000).toLocaleString('en')} kB
      </p>
      <div>
        <Button
          variant="primary"
          icon={icons.download}
          isDisabled={isWorking || sounding.isSecret === true}
          disabledReason={isWorking ? 'A file is being made.' : secretWords}
          onPress={() => keep()}
        >
          Save as WAV
        </Button>
      </div>
      <KeptWords state={state} onStop={stop} onKeepWith={keep} />
    </>
  );
}

function LengthFields({ settings, given, plan }: { settings: KeepSettings; given: Given; plan: KeepPlan }) {
  const { seconds, ends } = settings;
  const { min, max } = keepLimits.seconds;
  const isRound = canBeRounds(given);
  return (
    <>
      <NumberField
        label="Length"
        unit="s"
        {...keepLimits.seconds}
        step={0.5}
        allowed={`a number of seconds from ${min} to ${max}`}
        value={seconds}
        onChange={(next) => setKeep({ seconds: next })}
      />
      {isRound ? (
        <ChoiceField
          label="Ends"
          value={ends}
          options={[
            { value: 'rounds', label: 'Whole rounds', hint: sayRounds(plan) },
            { value: 'fades', label: 'Fades', hint: 'It comes and goes within 5 ms at both ends.' },
          ]}
          onChange={(next) => setKeep({ ends: next })}
        />
      ) : (
        <p className="field-description">{sayEnds(given)}</p>
      )}
    </>
  );
}

function SampleFields({ settings }: { settings: KeepSettings }) {
  const { rateHz, depth, isDithered } = settings;
  const [isOwn, setOwn] = useState(!commonRatesHz.includes(rateHz));
  const { min, max } = keepLimits.rateHz;
  return (
    <>
      <div className="field-pair">
        <SelectField
          label="Rate of the file"
          value={isOwn ? 'own' : String(rateHz)}
          options={[
            ...commonRatesHz.map((hz) => ({
              value: String(hz),
              label: formatQuantity(hz, 'Hz', { significant: 5 }),
            })),
            { value: 'own', label: 'Another' },
          ]}
          onChange={(next) => {
            setOwn(next === 'own');
            if (next !== 'own') setKeep({ rateHz: Number(next) });
          }}
        />
        {isOwn && (
          <NumberField
            label="Own rate"
            unit="Hz"
            isInteger
            {...keepLimits.rateHz}
            step={100}
            allowed={`a whole number of hertz from ${min} to ${max}`}
            value={rateHz}
            onChange={(next) => setKeep({ rateHz: next })}
          />
        )}
      </div>
      <ChoiceField
        label="Depth"
        value={depth}
        options={[
          { value: '8', label: '8 bits' },
          { value: '16', label: '16' },
          { value: '24', label: '24' },
          { value: '32f', label: '32 float' },
        ]}
        onChange={(next) => setKeep({ depth: next })}
      />
      {takesDither(depth) && (
        <SwitchField
          label="Dither"
          isOn={isDithered}
          onChange={(next) => setKeep({ isDithered: next })}
          aside={
            <Explain title="Dither">
              <p>
                Triangular noise of up to one code of the file each way is added before its samples are
                rounded, so that the file’s own rounding makes noise and no lines: 4.8 dB more of it than the
                rounding alone. It is seeded: the same sound gives the same file.
              </p>
              <p>
                On is good wherever the file is to be listened to or measured. The table’s own rounding stays.
              </p>
            </Explain>
          }
        />
      )}
    </>
  );
}

function LevelField({ settings: { depth, level, isDithered } }: { settings: KeepSettings }) {
  const fullDbfs = fullScaleDbfs(depth, isDithered && takesDither(depth));
  return (
    <ChoiceField
      label="Level"
      value={level}
      options={[
        {
          value: 'full-scale',
          label: 'As the table’s',
          hint: `Full scale of the table is the file’s largest code${fullDbfs < -0.005 ? `, ${formatQuantity(fullDbfs, 'dBFS', { decimals: 2 })}` : ''}. Nothing is clipped: you are asked where it would be.`,
        },
        {
          value: 'peak',
          label: 'Peak at −1 dBFS',
          hint: 'The strongest sample comes to lie at −1 dBFS, whatever the table’s level.',
        },
      ]}
      onChange={(next) => setKeep({ level: next })}
      aside={
        <Explain title="Level">
          <p>
            A wave that a pin holds in steps swings a little beyond them once it is limited to half of the
            file’s rate, so that even a table within full scale can peak above it.
          </p>
          <p>
            Levels of two files can be compared where both have the table’s full scale. A floating-point file
            holds what lies beyond full scale as well.
          </p>
        </Explain>
      }
    />
  );
}

const heardWords: Readonly<Record<string, string>> = {
  ideal: 'the ideal curve',
  table: 'the quantised table',
  ladder: 'the table through the board’s converter',
  output: 'the table after the board’s output stage',
};

const ownerWords: Readonly<Record<string, string>> = {
  bits: 'what “Bits by ear” plays',
  keys: 'what the keys play',
  pattern: 'the pulses and pauses',
};

function sayWhat({ sound, hearing, score }: Given, owner: string | null): string {
  const what =
    owner === null
      ? (heardWords[hearing] ?? 'what is heard now')
      : (ownerWords[owner] ?? 'what is heard now');
  const { kind } = sound.voices[hearing].drive ?? sound.drive;
  if ((score ?? null) !== null) return `${what}, from the beginning`;
  if (kind === 'once') return `${what}, once through`;
  return kind === 'accumulator' ? `${what} from a phase accumulator` : `${what} as a loop`;
}

function sayRounds({ rounds, seconds }: KeepPlan): string {
  if (rounds === null) return 'The file goes on without a seam where it is played as a loop.';
  const off =
    Math.abs(rounds.cents) < 5e-7
      ? 'exactly'
      : `${formatQuantity(rounds.cents, '', { significant: 2 })} cents off`;
  return `${rounds.rounds.toLocaleString('en')} rounds in ${rounds.frames.toLocaleString('en')} samples, ${formatQuantity(seconds, 's', { significant: 6 })}: played as a loop, it has no seam. The tone is kept ${off}.`;
}

function sayEnds({ sound, hearing, score }: Given): string {
  if ((score ?? null) !== null) return 'It begins with its first event and goes out within 5 ms at its end.';
  const { kind } = sound.voices[hearing].drive ?? sound.drive;
  if (kind === 'once')
    return 'One pass: it goes out within 5 ms behind the last entry, and the rest of the file is silent.';
  return kind === 'loop'
    ? 'It comes and goes within 5 ms at both ends, as one round is longer than the longest file.'
    : 'It comes and goes within 5 ms at both ends: an accumulator’s round seldom fits whole samples of the file.';
}
