import { Button, Explain, SelectField } from '../../../../components/index.ts';
import { FieldProblem } from '../../../../components/field-frame.tsx';
import { bendSemitones, everyInput, useMidi } from './use-midi.ts';
import type { NotePlayer } from './use-note-player.ts';

/** MIDI inputs, once they are asked for. */
export function MidiPart({ player }: { player: NotePlayer }) {
  const midi = useMidi(player);
  const { state, inputs } = midi;
  return (
    <div className="space-y-2">
      <div className="key-line">
        {state === 'off' ? (
          <Button size="small" onPress={midi.open}>
            Listen to MIDI inputs
          </Button>
        ) : (
          <Button size="small" onPress={midi.close}>
            {state === 'opening' ? 'Do not ask for MIDI' : 'Let MIDI go'}
          </Button>
        )}
        <Explain title="MIDI">
          <p>
            Notes and the pitch wheel of MIDI inputs (MIDI 1.0), where the browser has them; it asks you
            first. The wheel bends by ±{bendSemitones} semitones (common practice, no source). Velocity
            changes nothing: a pin plays a table at its own level.
          </p>
          <p>
            An input starts no sound by itself: press Get ready, or any key here, first. Inputs may be plugged
            in and out meanwhile.
          </p>
        </Explain>
      </div>
      {state === 'on' && inputs.length > 0 && (
        <SelectField
          label="MIDI input"
          value={midi.chosen}
          options={[
            { value: everyInput, label: inputs.length === 1 ? 'Every input' : `All ${inputs.length} inputs` },
            ...inputs.map(({ id, name }) => ({ value: id, label: name })),
          ]}
          onChange={midi.choose}
        />
      )}
      <div role="status">
        {state === 'opening' && <p className="field-description">The browser may ask you now.</p>}
        {state === 'on' && inputs.length === 0 && (
          <p className="field-description">No MIDI input is there. Plug one in; it is taken up at once.</p>
        )}
        {state === 'on' && inputs.length > 0 && !player.isReady && (
          <p className="field-description">Press Get ready, and what is played there is heard.</p>
        )}
        {midi.trouble !== null && <FieldProblem id="midi-trouble">{midi.trouble}</FieldProblem>}
      </div>
    </div>
  );
}
