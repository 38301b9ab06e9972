import { Button, Explain, SwitchField, icons } from '../../../components/index.ts';
import { VolumeField } from '../../../audio/volume-field.tsx';
import { useLive } from '../../../live/index.ts';
import { BeyondNote, HearingCaution, UnipolarNote } from './care.tsx';
import { HeardField } from './heard-field.tsx';
import { ListenRecesses } from './listen-recesses.tsx';
import { ListenStatus } from './listen-status.tsx';
import { useListenControls, useListening } from './listening.tsx';
import { Meter } from './meter.tsx';
import { PlaybackFields } from './playback-fields.tsx';
import { stopsWhenHidden } from './stop-when-hidden.ts';

/** Everything in the panel that is seen. */
export function ListenBody() {
  const { status, toggle, table, playback, changePlayback, volumeDb, sounding } = useListening();
  const { setVolumeDb, setStopPlace, makeReady } = useListenControls();
  const isOn = status !== 'silent';
  return (
    <div className="space-y-4">
      <h3 className="flex items-center gap-2">
        Listen
        <ListenExplain />
      </h3>
      <div ref={setStopPlace} className="listen-controls" onPointerEnter={makeReady} onFocus={makeReady}>
        <Button variant="primary" icon={isOn ? icons.stop : icons.play} onPress={toggle}>
          {isOn ? 'Stop' : 'Play'}
        </Button>
        <HeardField />
      </div>
      <ListenStatus />
      <VolumeField value={volumeDb} onChange={setVolumeDb} />
      <HearingCaution />
      {sounding.isSecret === true ? (
        <p className="field-description">
          Level and spectrum are hidden during the blind test: they would tell what X is.
        </p>
      ) : (
        <Meter />
      )}
      <PlaybackFields playback={playback} onChange={changePlayback} table={table.definition.table} />
      <BeyondNote />
      <UnipolarNote />
      <SwitchField
        label="Stop when this tab is hidden"
        isOn={useLive(stopsWhenHidden)}
        onChange={stopsWhenHidden.set}
      />
      <ListenRecesses />
    </div>
  );
}

function ListenExplain() {
  return (
    <Explain title="Listen">
      <p>
        Ideal curve: the smooth curve through the entries before they were quantised, its lines{' '}
        <code>m·fs/N</code> up to <code>fs/2</code>.
      </p>
      <p>
        Quantised table: the staircase that a pin holds. Line m has{' '}
        <code>2·|X(m mod N)|/N · |sin(πm/N)/(πm/N)|</code>, images included, up to half of the rate at which
        this browser plays.
      </p>
      <p>
        Through the ladder or converter: the same staircase of the board’s levels, lowest to highest as −1…1.
        After the output stage: that through the output’s resistance and capacitance, the op-amp’s bandwidth
        and the filter.
      </p>
      <p>
        Left out: glitches between codes, slewing of the op-amp, pulses of a PWM pin, noise and jitter. The
        mean is taken out. You can change over while it plays.
      </p>
    </Explain>
  );
}
