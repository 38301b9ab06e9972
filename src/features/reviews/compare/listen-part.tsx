import { useEffect, useMemo, useState } from 'react';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { volumeRangeDb, type Sound } from '../../../audio/index.ts';
import { usePreview } from '../../../audio/use-preview.ts';
import { VolumeField } from '../../../audio/volume-field.tsx';
import { Button, Caution, ChoiceField, Explain, Panel, icons } from '../../../components/index.ts';
import { FieldProblem } from '../../../components/field-frame.tsx';
import { matchLoudness } from './match-loudness.ts';
import type { Pair } from './side.ts';
import { toneOf } from './tone.ts';

interface ListenPartProps {
  pair: Pair;
  names: { a: string; b: string };
}

/** Until a context is open its rate is not known; this is the usual one. */
const usualContextRateHz = 48_000;

/** Plays both at one loudness, and goes from one to the other without a gap. */
export function ListenPart({ pair, names }: ListenPartProps) {
  const { a, b } = pair;
  const [contextRateHz, setContextRateHz] = useState(usualContextRateHz);
  const toneHz = toneOf(b.revision.playback ?? a.revision.playback, b.revision.definition.table);
  const matched = useMemo(
    () =>
      matchLoudness(
        { values: a.table.values, table: a.revision.definition.table },
        { values: b.table.values, table: b.revision.definition.table },
        toneHz,
        contextRateHz,
      ),
    [a, b, toneHz, contextRateHz],
  );
  return (
    <Panel title="Listen to both">
      {matched.kind === 'matched' ? (
        <Player
          sound={matched.sound}
          names={names}
          turnedDownDb={matched.turnedDownDb}
          toneHz={toneHz}
          onContextRate={setContextRateHz}
        />
      ) : (
        <p>{saySilent(matched.which, names)}</p>
      )}
    </Panel>
  );
}

const saySilent = (which: 'a' | 'b' | 'both', names: { a: string; b: string }) =>
  which === 'both'
    ? 'Neither of the two moves, so there is nothing to hear.'
    : `The wave of ${names[which]} does not move, so it makes no sound that the other could be brought to.`;

interface PlayerProps {
  sound: Sound;
  names: { a: string; b: string };
  turnedDownDb: { a: number; b: number };
  toneHz: number;
  /** Is told the rate at which the browser plays, once that is known. */
  onContextRate: (hz: number) => void;
}

function Player({ sound, names, turnedDownDb, toneHz, onContextRate }: PlayerProps) {
  const [hearing, setHearing] = useState<'a' | 'b'>('b');
  const [volumeDb, setVolumeDb] = useState<number>(volumeRangeDb.start);
  const { status, trouble, toggle, preview } = usePreview(sound, hearing, volumeDb);
  useEffect(() => {
    if (preview !== null) onContextRate(preview.contextRateHz);
  }, [preview, onContextRate]);
  const isOn = status !== 'silent';
  const heard = names[hearing];
  return (
    <div className="space-y-4">
      <div className="compare-listen">
        <Button variant="primary" icon={isOn ? icons.stop : icons.play} onPress={toggle}>
          {isOn ? 'Stop' : 'Play'}
        </Button>
        <ChoiceField
          label="Heard"
          hideLabel
          value={hearing}
          options={[
            { value: 'a', label: names.a },
            { value: 'b', label: names.b },
          ]}
          onChange={setHearing}
        />
        <Explain title="Equal loudness">
          <p>
            Both are played as loops of the same tone, {formatQuantity(toneHz, 'Hz')}, as their pins give
            them: steps, images and all, without their mean. The effective value (RMS) is{' '}
            <code>√(Σa²/2)</code> over the lines that are heard, those below half of the rate at which this
            browser plays. The one with the larger value is turned down to that of the other; nothing is
            turned up.
          </p>
          <p>
            Equal RMS is close to equal loudness for waves of like spectra; a wave with stronger high partials
            may still seem louder.
          </p>
        </Explain>
      </div>
      <div role="status">
        {status === 'starting' && <p className="field-description">Starting…</p>}
        {status === 'playing' && <p className="field-description">Playing {heard} as a loop.</p>}
        {status === 'silent' && (
          <p className="field-description">Brought to equal RMS. {sayTurnedDown(turnedDownDb, names)}</p>
        )}
        {trouble !== null && <FieldProblem id="compare-trouble">{trouble}</FieldProblem>}
      </div>
      <VolumeField value={volumeDb} onChange={setVolumeDb} />
      <Caution title="Mind your hearing">
        It starts quietly. Take headphones off, or turn the device down, before you press play; then raise the
        volume slowly.
      </Caution>
    </div>
  );
}

function sayTurnedDown({ a, b }: { a: number; b: number }, names: { a: string; b: string }): string {
  const most = Math.max(a, b);
  if (most < 0.05) return 'The two are equally strong, so neither is changed.';
  const by = formatQuantity(most, 'dB', { decimals: 1 });
  return `For that, ${a > b ? names.a : names.b} is turned down by ${by}.`;
}
