import { useState } from 'react';
import { nameOfFile, type CycleBounds, type Join } from '../../../../shared/imports/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, ChoiceField, NumberField, SelectField } from '../../../components/index.ts';
import type { ImportsWorker } from '../../../workers/imports-client.ts';
import type { OpenedRecording } from '../../../workers/imports-messages.ts';
import { BoundsDrawing } from './bounds-drawing.tsx';
import { Faults } from './faults.tsx';
import { benchTable, type Brought } from './put-on-bench.ts';
import { Sketch } from './sketch.tsx';
import { fileOf, type Chosen } from './chosen.ts';
import { faultsOf, useAnswer } from './use-imports.ts';

interface RecordingViewProps {
  chosen: Chosen;
  bytes: Uint8Array;
  opened: OpenedRecording;
  worker: ImportsWorker;
  onPut: (brought: Brought) => void;
}

const joins = {
  crossfade: {
    value: 'crossfade',
    label: 'Crossfade',
    hint: 'The last part goes over into what stands before the cycle.',
  },
  harmonics: {
    value: 'harmonics',
    label: 'Harmonics',
    hint: 'The cycle and half of each neighbour, kept as their first harmonics: closes by itself, with less noise.',
  },
  none: {
    value: 'none',
    label: 'As cut',
    hint: 'Nothing is changed; the seam is as good as the bounds are.',
  },
} as const;

/** Values that a cut cycle is kept in, before it is tabulated. */
const cutLength = 1_024;

/** One cycle out of a recording: bounds, how its ends are joined, and how well the loop then closes. */
export function RecordingView({ chosen, bytes, worker, onPut, ...props }: RecordingViewProps) {
  const [opened, setOpened] = useState(props.opened);
  const [channel, setChannel] = useState(0);
  const [bounds, setBounds] = useState(props.opened.bounds);
  const [found, setFound] = useState(props.opened.found);
  const [kind, setKind] = useState<Join['kind']>(props.opened.found ? 'crossfade' : 'none');
  const [sharePercent, setSharePercent] = useState(10);
  const [highest, setHighest] = useState(32);
  const [faults, setFaults] = useState<readonly string[]>(opened.why === null ? [] : [opened.why]);
  const { samples, header } = opened;

  const join: Join =
    kind === 'crossfade'
      ? { kind, share: sharePercent / 100 }
      : kind === 'harmonics'
        ? { kind, highest }
        : { kind };
  const cut = useAnswer({ bounds, join, channel }, (wanted) =>
    worker.run('cut', { bounds: wanted.bounds, length: cutLength, join: wanted.join }),
  );
  const attempt = async (work: () => Promise<void>) => {
    try {
      await work();
      setFaults([]);
    } catch (error) {
      setFaults(faultsOf(error));
    }
  };
  const open = (next: number) =>
    attempt(async () => {
      const other = await worker.run('openRecording', { bytes, channel: next });
      setOpened(other);
      setChannel(next);
      setFound(other.found);
      setBounds(other.bounds);
    });
  const findAgain = () =>
    attempt(async () => {
      const answer = await worker.run('findAgain', { bounds });
      setFound(answer.found);
      setBounds(answer.bounds);
    });
  const snap = () => attempt(async () => setBounds(await worker.run('snap', { bounds })));

  const period = bounds.endSample - bounds.startSample;
  const toneHz = header.sampleRateHz / period;
  const put = () => {
    if (cut.result === null) return;
    onPut({
      definition: {
        schema: 1,
        name: nameOfFile(chosen.name),
        source: cut.result.source,
        level: { removeMean: true },
        table: benchTable(),
      },
      toneHz,
      file: fileOf(chosen),
    });
  };

  return (
    <div className="space-y-4">
      <h3>
        {chosen.name}: {formatQuantity(header.length / header.sampleRateHz, 's')},{' '}
        {formatQuantity(header.sampleRateHz, 'Hz')}, {header.sampleBits} bits
      </h3>
      {header.channels > 1 && (
        <SelectField
          label="Channel"
          value={String(channel)}
          options={Array.from({ length: header.channels }, (_, one) => ({
            value: String(one),
            label: String(one + 1),
          }))}
          onChange={(next) => void open(Number(next))}
        />
      )}
      <Faults faults={faults} />
      <BoundsDrawing samples={samples} bounds={bounds} onChange={setBounds} />
      <p aria-live="polite">
        One cycle of {formatQuantity(period, 'samples', { significant: 6 })},{' '}
        {formatQuantity(toneHz, 'Hz', { significant: 5 })}
        {found &&
          `. Cycle and next are ${Math.round(found.clarity * 100)} % alike where the period was found`}
        .
      </p>
      <Bounds bounds={bounds} last={samples.length - 1} onChange={setBounds} />
      <div className="form-actions">
        <Button onPress={() => void findAgain()}>Find the period here</Button>
        <Button onPress={() => void snap()}>Snap to rising zero crossings</Button>
      </div>
      <ChoiceField label="Ends joined by" value={kind} options={Object.values(joins)} onChange={setKind} />
      {kind === 'crossfade' && (
        <NumberField
          label="Crossfade"
          unit="%"
          min={1}
          max={50}
          allowed="a number from 1 to 50"
          description="Share of the cycle that it takes."
          value={sharePercent}
          onChange={setSharePercent}
        />
      )}
      {kind === 'harmonics' && (
        <NumberField
          label="Highest harmonic kept"
          isInteger
          min={1}
          max={cutLength / 2 - 1}
          allowed={`a whole number from 1 to ${cutLength / 2 - 1}`}
          value={highest}
          onChange={setHighest}
        />
      )}
      <Faults faults={cut.faults} />
      {cut.result && <CutResult {...cut.result} />}
      <Button
        variant="primary"
        onPress={put}
        isDisabled={cut.result === null}
        disabledReason="The cycle cannot be cut as it is set"
      >
        Put the cycle on the bench
      </Button>
    </div>
  );
}

function CutResult({
  values,
  seam,
}: {
  values: Float64Array;
  seam: { step: number; largestWithin: number; stepShare: number };
}) {
  const isEven = Math.abs(seam.step) <= seam.largestWithin;
  return (
    <>
      <Sketch values={values} label="The cycle as it is cut" />
      <p role="group" aria-label="Step at the seam">
        Step at the seam: {formatQuantity(100 * seam.stepShare, '%', { decimals: 2 })} of the whole swing
        {isEven ? ', no larger than the steps within.' : ', larger than any step within: it will be heard.'}
      </p>
    </>
  );
}

interface BoundsProps {
  bounds: CycleBounds;
  last: number;
  onChange: (bounds: CycleBounds) => void;
}

/** The bounds as numbers; the drawing moves the same ones. */
function Bounds({ bounds: { startSample, endSample }, last, onChange }: BoundsProps) {
  return (
    <div className="field-pair">
      <NumberField
        label="Start, in samples"
        min={0}
        max={endSample - 2}
        allowed={`a number from 0 to ${Math.floor(endSample - 2)}`}
        value={rounded(startSample)}
        onChange={(next) => onChange({ startSample: next, endSample })}
      />
      <NumberField
        label="End, in samples"
        min={startSample + 2}
        max={last}
        allowed={`a number from ${Math.ceil(startSample + 2)} to ${last}`}
        value={rounded(endSample)}
        onChange={(next) => onChange({ startSample, endSample: next })}
      />
    </div>
  );
}

const rounded = (samples: number) => Math.round(samples * 1_000) / 1_000;
