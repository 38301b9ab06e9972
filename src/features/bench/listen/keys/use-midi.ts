import { useCallback, useEffect, useRef, useState } from 'react';
import type { MidiEvent } from '../../../../../shared/listening/index.ts';
import { openMidi, type MidiInputs } from '../../../../audio/midi.ts';
import type { NotePlayer } from './use-note-player.ts';

export const everyInput = 'every';

/** What the wheel bends to either side: two semitones, as most instruments do at first (common practice, no source). */
export const bendSemitones = 2;

export interface Midi {
  readonly state: 'off' | 'opening' | 'on';
  /** In words for the screen. */
  readonly trouble: string | null;
  readonly inputs: MidiInputs['inputs'];
  /** Id of the one that is listened to, or `everyInput`. */
  readonly chosen: string;
  readonly choose: (id: string) => void;
  /** Belongs in the handler of a press: the browser may ask first. */
  readonly open: () => void;
  readonly close: () => void;
}

const holderOf = (inputId: string, channel: number, note: number) => `midi ${inputId} ${channel} ${note}`;

/** Plays what MIDI inputs say, once they are asked for. What they say starts no sound by itself. */
export function useMidi({ performer, pressIfReady }: NotePlayer): Midi {
  const [state, setState] = useState<Midi['state']>('off');
  const [trouble, setTrouble] = useState<string | null>(null);
  const [inputs, setInputs] = useState<MidiInputs['inputs']>([]);
  const [chosen, setChosen] = useState(everyInput);
  const opened = useRef<MidiInputs | null>(null);
  /** Counts openings, so that one that comes too late is closed again. */
  const opening = useRef(0);

  // The chosen one may have been taken away; it is the choice again when it is plugged in.
  const listenedTo = inputs.some(({ id }) => id === chosen) ? chosen : everyInput;
  const hear = (inputId: string, event: MidiEvent) => {
    if (listenedTo !== everyInput && inputId !== listenedTo) return;
    switch (event.kind) {
      case 'on':
        return pressIfReady(holderOf(inputId, event.channel, event.note), event.note);
      case 'off':
        return performer.release(holderOf(inputId, event.channel, event.note));
      case 'bend':
        return performer.bend(bendSemitones * event.bend);
      case 'all-off':
        return performer.releaseOf(
          event.channel === null ? `midi ${inputId} ` : `midi ${inputId} ${event.channel} `,
        );
    }
  };
  const latest = useRef(hear);
  useEffect(() => {
    latest.current = hear;
  });

  const close = useCallback(() => {
    opening.current += 1;
    opened.current?.close();
    opened.current = null;
    performer.releaseOf('midi ');
    performer.bend(0);
    setState('off');
    setInputs([]);
  }, [performer]);

  const open = useCallback(() => {
    const request = (opening.current += 1);
    const isOld = () => request !== opening.current;
    setState('opening');
    setTrouble(null);
    openMidi({
      onEvent: (id, event) => latest.current(id, event),
      onGone: (id) => {
        performer.releaseOf(`midi ${id} `);
        performer.bend(0);
      },
      onInputs: setInputs,
    }).then(
      (access) => {
        if (isOld()) return access.close();
        opened.current = access;
        setInputs(access.inputs);
        setState('on');
      },
      (error: Error) => {
        if (isOld()) return;
        setTrouble(error.message);
        setState('off');
      },
    );
  }, [performer]);

  useEffect(
    () => () => {
      opening.current += 1;
      opened.current?.close();
      opened.current = null;
    },
    [],
  );

  const choose = useCallback(
    (id: string) => {
      performer.releaseOf('midi ');
      performer.bend(0);
      setChosen(id);
    },
    [performer],
  );
  return { state, trouble, inputs, chosen: listenedTo, choose, open, close };
}
