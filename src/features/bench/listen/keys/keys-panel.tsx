import '../../rates/rates.css';
import './keys.css';
import { useMemo, useRef, useState, useSyncExternalStore } from 'react';
import { a4RangeHz, noteName } from '../../../../../shared/listening/index.ts';
import {
  Button,
  ChoiceField,
  Explain,
  IconButton,
  NumberField,
  SwitchField,
  icons,
  useKeyGroup,
  type KeyGroup,
  type SelectOption,
} from '../../../../components/index.ts';
import { FieldProblem } from '../../../../components/field-frame.tsx';
import { useLive } from '../../../../live/index.ts';
import { rateWishes } from '../../rates/wishes.ts';
import { useListening } from '../listening.tsx';
import { useComputerKeys, useKeyCaps } from './computer-keys.ts';
import { GlidePart } from './glide-part.tsx';
import { KeyCourses } from './key-courses.tsx';
import {
  coursesFrom,
  firstNoteOf,
  keyWishes,
  octaves,
  portamentoMsAtMost,
  wish,
  type KeyWishes,
} from './key-wishes.ts';
import { MidiPart } from './midi-part.tsx';
import { NoteFacts, NoteTable } from './note-facts.tsx';
import { chosenDrive, toneDrivesOf, type ToneDrives } from './tone-drives.ts';
import { useNotePlayer } from './use-note-player.ts';

/** From this width on there is room for two octaves, one above the other. */
const roomy = matchMedia('(min-width: 30rem)');

const watchRoom = (listener: () => void) => {
  roomy.addEventListener('change', listener);
  return () => roomy.removeEventListener('change', listener);
};

const keyGroup: KeyGroup = {
  title: 'Notes',
  keys: [
    { caps: ['←'], does: 'A semitone down, with the focus on a note; → a semitone up' },
    { caps: ['↑'], does: 'An octave up, with the focus on a note; ↓ an octave down' },
    { caps: ['Space'], does: 'Play the note that has the focus, for as long as it is held' },
    { caps: ['Q'], does: 'This row: the upper octave, with the focus on a note or while letter keys play' },
    { caps: ['A'], does: 'This row: the lower octave, likewise' },
  ],
};

/** Plays the table as notes, by the keys here, letter keys and MIDI, each note as the part would make it. */
export function KeysPanel() {
  const { table, playback } = useListening();
  const { a4Hz, octave, portamentoMs, by } = useLive(keyWishes);
  const compareBits = Number(useLive(rateWishes).compareBits);
  const settings = table.definition.table;
  const drives = useMemo(
    () => toneDrivesOf(settings, playback, compareBits),
    [settings, playback, compareBits],
  );
  const drive = useMemo(() => chosenDrive(drives, by), [drives, by]);
  const noteSettings = useMemo(() => ({ drive, a4Hz, portamentoMs }), [drive, a4Hz, portamentoMs]);
  const player = useNotePlayer(noteSettings, firstNoteOf(octave) + 9);
  const { performer } = player;
  const { sounding, atHand, bend, fault } = useLive(performer.state);

  const isRoomy = useSyncExternalStore(watchRoom, () => roomy.matches);
  const courses = coursesFrom(octave, isRoomy ? 2 : 1);
  const notes = courses.flat();
  const [playsByLetters, setPlaysByLetters] = useState(false);
  const group = useRef<HTMLDivElement>(null);
  const caps = useKeyCaps();
  useKeyGroup(keyGroup);
  useComputerKeys({
    areOn: playsByLetters,
    group,
    onPress: (code, step) => {
      const note = firstNoteOf(octave) + step;
      if (notes.includes(note)) player.press(`key ${code}`, note);
    },
    onRelease: (code) => performer.release(`key ${code}`),
    onReleaseAll: () => performer.releaseAll(),
  });

  return (
    <div className="space-y-4">
      <div className="key-line">
        <Button
          size="small"
          icon={player.isReady ? icons.stop : icons.play}
          variant={player.isReady ? 'primary' : 'plain'}
          onPress={player.toggle}
        >
          {player.isReady ? 'Stop the notes' : 'Get ready'}
        </Button>
        <span className="field-description" role="status">
          {player.isReady
            ? sounding === null
              ? 'Ready: the next note sounds at once.'
              : `${noteName(sounding)} sounds.`
            : 'The first note starts the sound, quietly; Get ready starts it without one.'}
        </span>
      </div>
      <div className="key-line key-octave">
        <IconButton
          label="An octave down"
          icon={icons.arrowDown}
          size="small"
          isDisabled={octave <= octaves.lowest}
          disabledReason="There are no notes below."
          onPress={() => wish({ octave: octave - 1 })}
        />
        <span>
          {noteName(notes[0])} to {noteName(notes[notes.length - 1])}
        </span>
        <IconButton
          label="An octave up"
          icon={icons.arrowUp}
          size="small"
          isDisabled={octave + courses.length > octaves.highest}
          disabledReason="There are no notes above."
          onPress={() => wish({ octave: octave + 1 })}
        />
      </div>
      <KeyCourses
        {...{ group, courses, a4Hz, sounding, atHand }}
        caps={isRoomy ? caps : []}
        whyNot={(note) => performer.whyNot(note)}
        onPress={player.press}
        onRelease={player.release}
        onLookAt={(note) => performer.lookAt(note)}
      />
      <div aria-live="polite">{fault !== null && <FieldProblem id="keys-fault">{fault}</FieldProblem>}</div>
      <SwitchField
        label="Play with the letter keys"
        isOn={playsByLetters}
        onChange={(isOn) => {
          performer.releaseAll();
          setPlaysByLetters(isOn);
        }}
        description={
          playsByLetters
            ? 'Two rows of letters play wherever nothing takes text, and are no shortcuts meanwhile.'
            : 'Now they play only while the focus is on a note.'
        }
      />
      <MidiPart player={player} />
      <NoteFacts {...{ drive, a4Hz, bend }} note={atHand} />
      <MadeBy drives={drives} kind={drive.kind} />
      <div className="field-pair">
        <NumberField
          label="A4"
          unit="Hz"
          min={a4RangeHz.min}
          max={a4RangeHz.max}
          allowed={`a number of hertz from ${a4RangeHz.min} to ${a4RangeHz.max}`}
          value={a4Hz}
          onChange={(hz) => wish({ a4Hz: hz })}
          description={a4Hz === 440 ? 'The standard tuning frequency (ISO 16).' : 'ISO 16 has 440 Hz.'}
        />
        <NumberField
          label="Glide from note to note"
          unit="ms"
          min={0}
          max={portamentoMsAtMost}
          step={10}
          allowed={`a number of milliseconds from 0 to ${portamentoMsAtMost}`}
          value={portamentoMs}
          onChange={(ms) => wish({ portamentoMs: ms })}
          description="From a note that is still held to the next, one update each millisecond."
        />
      </div>
      <NoteTable {...{ drive, a4Hz, notes }} />
      <GlidePart {...{ player, drive, a4Hz }} />
    </div>
  );
}

const madeByLabels = { rate: 'Free rate', timer: 'Compare value', accumulator: 'Step word' } as const;
const madeByHints = {
  rate: 'A loop at whatever sample rate the note takes.',
  timer: 'A loop; the timer’s compare value is the nearest to the note.',
  accumulator: 'One sample rate; the step word is the nearest to the note.',
} as const;

/** Which of the part's registers makes the notes, where there is a choice. */
function MadeBy({ drives, kind }: { drives: ToneDrives; kind: keyof typeof madeByLabels }) {
  const kinds = (['rate', 'timer', 'accumulator'] as const).filter((one) => drives[one] !== null);
  if (kinds.length === 1) {
    return (
      <p className="field-description">
        Notes take whatever sample rate gives them. Choose a timer’s settings or a phase accumulator for this
        table, and they go by compare values or step words.
      </p>
    );
  }
  return (
    <ChoiceField
      label="Notes are made by"
      value={kind}
      options={kinds.map((one): SelectOption<typeof kind> => ({
        value: one,
        label: madeByLabels[one],
        hint: madeByHints[one],
      }))}
      onChange={(next) => wish({ by: next satisfies KeyWishes['by'] })}
      aside={
        <Explain title="Notes are made by">
          <p>
            At first as the bench plays the table. A compare value changes the sample rate of a loop; a step
            word changes how fast an accumulator goes through the table at one sample rate.
          </p>
        </Explain>
      }
    />
  );
}
