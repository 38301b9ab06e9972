import { useCallback, useEffect, useLayoutEffect, useMemo, useRef, useState } from 'react';
import { flushSync } from 'react-dom';
import type { Score, Sound } from '../../../../../shared/listening/sound.ts';
import { useListening } from '../listening.tsx';
import { NotePerformer, type NoteSettings } from './note-performer.ts';
import { playedDrive } from './tone-drives.ts';

const owner = 'keys';

export interface NotePlayer {
  readonly performer: NotePerformer;
  /** Whether notes are heard at once: the sound is on, and the keys have it. */
  readonly isReady: boolean;
  /** Presses a note and starts the sound where it is silent. Belongs in the handler of a press or a key. */
  readonly press: (holder: string, note: number) => void;
  /** Lets a note go. Belongs in the handler of what ended the press. */
  readonly release: (holder: string) => void;
  /** Presses a note that is heard only if the sound is on: what does not come from the page starts nothing. */
  readonly pressIfReady: (holder: string, note: number) => void;
  /** Plays a score of its own. Belongs in the handler of a press. */
  readonly perform: (score: Score) => void;
  /** Starts the player without a note, or stops it. Belongs in the handler of a press. */
  readonly toggle: () => void;
}

/** Plays notes on the listen panel's sound: takes it over with the first press and gives it back when it stops. */
export function useNotePlayer(settings: NoteSettings, firstNote: number): NotePlayer {
  const listening = useListening();
  const { sound, hearing, playback, table, status, preview } = listening;
  const isOwner = listening.owner === owner;
  const [performer] = useState(() => new NotePerformer(settings, firstNote, () => performance.now()));

  const { drive } = settings;
  const { definition } = table;
  const played = useMemo(
    (): Sound => ({ voices: sound.voices, drive: playedDrive(drive, playback, definition.table) }),
    [sound, drive, playback, definition],
  );
  const latest = useRef({ listening, played });
  useLayoutEffect(() => {
    latest.current = { listening, played };
  });

  useEffect(() => {
    performer.tell((score) => {
      const { listening } = latest.current;
      if (listening.owner === owner) listening.preview?.perform(score);
    });
  }, [performer]);

  useEffect(() => performer.set(settings), [performer, settings]);

  // What it gave follows the bench. A score that it has already is not begun anew.
  const { take } = listening;
  useEffect(() => {
    if (isOwner) take(owner, { sound: played, hearing, score: performer.score });
  }, [isOwner, take, played, hearing, performer]);

  // A note that was pressed while the player was on its way. The panel hands over its own score first.
  useEffect(() => {
    if (isOwner && preview !== null) queueMicrotask(() => preview.perform(performer.score));
  }, [isOwner, preview, status, performer]);

  // Once stopped, Play is the panel's again; and what another took over is no longer held here.
  const wasOn = useRef(false);
  useEffect(() => {
    const hasStopped = wasOn.current && status === 'silent';
    wasOn.current = status !== 'silent';
    if (hasStopped) performer.forget();
    if (hasStopped && isOwner) take(owner, null);
  }, [status, isOwner, take, performer]);
  useEffect(() => {
    if (isOwner) return () => performer.forget();
  }, [isOwner, performer]);

  useEffect(
    () => () => {
      const { listening } = latest.current;
      if (listening.owner !== owner) return;
      listening.preview?.stop();
      listening.take(owner, null);
    },
    [],
  );

  const begin = useCallback(() => {
    const before = latest.current;
    if (before.listening.owner !== owner || before.listening.status === 'silent') {
      // The press itself must start the sound, and with what is given here.
      flushSync(() =>
        before.listening.take(owner, {
          sound: before.played,
          hearing: before.listening.hearing,
          score: performer.score,
        }),
      );
    }
    const { listening } = latest.current;
    if (listening.status === 'silent') listening.toggle();
  }, [performer]);

  // A finger put down is no press yet to browsers, and where it is a page's first they would refuse the sound. It then
  // starts as the finger is lifted, for the notes after.
  const isHeldBack = useRef(false);
  const beginOnPress = useCallback(() => {
    isHeldBack.current = isUntouched();
    if (!isHeldBack.current) begin();
  }, [begin]);

  const isReady = isOwner && status !== 'silent';
  return {
    performer,
    isReady,
    press: useCallback(
      (holder, note) => {
        if (performer.press(holder, note)) beginOnPress();
      },
      [performer, beginOnPress],
    ),
    release: useCallback(
      (holder) => {
        performer.release(holder);
        if (!isHeldBack.current || isUntouched()) return;
        isHeldBack.current = false;
        begin();
      },
      [performer, begin],
    ),
    pressIfReady: useCallback(
      (holder, note) => {
        if (isReady) performer.press(holder, note);
        else performer.lookAt(note);
      },
      [performer, isReady],
    ),
    perform: useCallback(
      (score) => {
        performer.perform(score);
        begin();
      },
      [performer, begin],
    ),
    toggle: useCallback(() => {
      if (isReady) latest.current.listening.toggle();
      else begin();
    }, [isReady, begin]),
  };
}

/** Whether nothing in the page was ever pressed; where the browser does not tell, something was. */
const isUntouched = () => 'userActivation' in navigator && !navigator.userActivation.hasBeenActive;
