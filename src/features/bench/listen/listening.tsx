import { createContext, useCallback, useContext, useEffect, useMemo, useState, type ReactNode } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import type { Score, Sound, Voice } from '../../../../shared/listening/sound.ts';
import type { StageParts } from '../../../../shared/output-stage/index.ts';
import { tableSound, volumeRangeDb, type AudioPreview, type PreviewState } from '../../../audio/index.ts';
import { usePreview } from '../../../audio/use-preview.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import type { Playback } from '../state/wave.ts';
import { driveOf } from './drive.ts';
import { useStopWhenHidden } from './stop-when-hidden.ts';
import { usePlayKey } from './use-play-key.ts';

/** What the panel itself lets be heard. */
export type Heard = 'ideal' | 'table' | 'ladder' | 'output';

/** What a part gives to sound. */
export interface Given {
  readonly sound: Sound;
  readonly hearing: string;
  readonly score?: Score | null;
  /** That nothing on the page may tell which voice is heard: to its parts it is always the first one. */
  readonly isSecret?: boolean;
}

/** Where it is heard: what a small loudspeaker leaves of it. */
export interface Device {
  readonly name: string;
  readonly impulseFor: (rateHz: number) => Float32Array<ArrayBuffer>;
  /** Linear gain at a frequency. */
  readonly response: (hz: number) => number;
}

export interface Listening {
  readonly table: TableAnswer;
  readonly playback: Playback;
  /** Changes how it is played: on the bench a step of undo, on a read-only page this page's alone. */
  readonly changePlayback: (next: Playback) => void;
  /** The board chosen on the bench, if its bits fit the table's; null on read-only pages. */
  readonly board: Board | null;
  /** Voices `ideal`, `table`, and with a board `ladder` and `output`. */
  readonly sound: Sound;
  readonly hearing: Heard;
  /** What sounds, or will with the next press: the panel's own, or what its owner gave. */
  readonly sounding: Given;
  readonly status: PreviewState['status'];
  readonly trouble: string | null;
  /** There once play has been pressed, or is about to be. */
  readonly preview: AudioPreview | null;
  /** Plays or stops. Belongs in the handler of a press or a key. */
  readonly toggle: () => void;
  /** Who decides now what sounds: null is the panel itself. */
  readonly owner: string | null;
  /** A part takes the sound over, changes what it gave, or gives it back with null; the former owner loses it. */
  readonly take: (owner: string, given: Given | null) => void;
  readonly volumeDb: number;
  /** Null: straight from the pin. */
  readonly device: Device | null;
  readonly setDevice: (device: Device | null) => void;
}

/** What only the panel's own fields change. */
export interface ListenControls {
  readonly isOnBench: boolean;
  /** Whether the panel is open. */
  readonly isInSight: boolean;
  readonly hear: (heard: Heard) => void;
  readonly setVolumeDb: (db: number) => void;
  readonly setOnBoard: (onBoard: OnBoard | null) => void;
  readonly giveBack: () => void;
  /** A press on play seems about to come. */
  readonly makeReady: () => void;
  /** What holds the panel's own stop; null before the panel has been opened. */
  readonly stopPlace: HTMLElement | null;
  readonly setStopPlace: (place: HTMLElement | null) => void;
  /** Whether it fell silent because the tab was hidden. */
  readonly wasHidden: boolean;
}

/** A board with what its voices are made of. */
export interface OnBoard {
  readonly board: Board;
  /** Of every code, in V; not all the same. */
  readonly volts: Float64Array;
  readonly stage: StageParts;
}

const ListeningContext = createContext<Listening | null>(null);
const ControlsContext = createContext<ListenControls | null>(null);

/** What is listened to, for a part of the listen panel. */
export function useListening(): Listening {
  const listening = useContext(ListeningContext);
  if (listening === null) throw new Error('This part belongs in the listen panel.');
  return listening;
}

export function useListenControls(): ListenControls {
  const controls = useContext(ControlsContext);
  if (controls === null) throw new Error('This part belongs in the listen panel.');
  return controls;
}

interface ListeningProviderProps {
  table: TableAnswer;
  playback: Playback;
  onPlaybackChange: (next: Playback) => void;
  isOnBench: boolean;
  /** Whether the panel is open. */
  isInSight: boolean;
  /** Whether it has ever been, so that play may be pressed. */
  isNear: boolean;
  children: ReactNode;
}

/** Holds the sound for the panel and its parts, so that it goes on while they are closed. */
export function ListeningProvider({
  table,
  playback,
  onPlaybackChange,
  isOnBench,
  isInSight,
  isNear,
  children,
}: ListeningProviderProps) {
  const [chosen, setChosen] = useState<Heard>('table');
  const [volumeDb, setVolumeDb] = useState<number>(volumeRangeDb.start);
  const [onBoard, setOnBoard] = useState<OnBoard | null>(null);
  const [owned, setOwned] = useState<{ owner: string; given: Given } | null>(null);
  const [device, setDevice] = useState<Device | null>(null);

  const fitting = onBoard?.board.output.bits === table.definition.table.bits ? onBoard : null;
  const sound = useOwnSound(table, playback, fitting);
  const hearing = chosen in sound.voices ? chosen : 'table';
  const own = useMemo((): Given => ({ sound, hearing }), [sound, hearing]);
  const sounding = owned?.given ?? own;
  const told = useMemo(
    (): Given =>
      sounding.isSecret === true ? { ...sounding, hearing: Object.keys(sounding.sound.voices)[0] } : sounding,
    [sounding],
  );
  const { status, trouble, toggle, makeReady, preview } = usePreview(
    sounding.sound,
    sounding.hearing,
    volumeDb,
    sounding.score,
    isNear,
  );
  useEffect(
    () => preview?.setDevice(device === null ? null : device.impulseFor(preview.contextRateHz)),
    [preview, device],
  );
  usePlayKey(toggle);
  const wasHidden = useStopWhenHidden(preview, status);

  const take = useCallback((owner: string, given: Given | null) => {
    setOwned((before) => {
      if (given !== null) return { owner, given };
      return before?.owner === owner ? null : before;
    });
  }, []);
  const giveBack = useCallback(() => setOwned(null), []);

  const [stopPlace, setStopPlace] = useState<HTMLElement | null>(null);
  const owner = owned?.owner ?? null;
  const board = fitting?.board ?? null;
  const listening = useMemo(
    (): Listening => ({
      table,
      playback,
      changePlayback: onPlaybackChange,
      board,
      sound,
      hearing,
      sounding: told,
      status,
      trouble,
      preview,
      toggle,
      owner,
      take,
      volumeDb,
      device,
      setDevice,
    }),
    [
      table,
      playback,
      onPlaybackChange,
      board,
      sound,
      hearing,
      told,
      status,
      trouble,
      preview,
      toggle,
      owner,
      take,
      volumeDb,
      device,
    ],
  );
  const controls = useMemo(
    (): ListenControls => ({
      isOnBench,
      isInSight,
      hear: setChosen,
      setVolumeDb,
      setOnBoard,
      giveBack,
      makeReady,
      stopPlace,
      setStopPlace,
      wasHidden,
    }),
    [isOnBench, isInSight, giveBack, makeReady, stopPlace, wasHidden],
  );
  return (
    <ListeningContext value={listening}>
      <ControlsContext value={controls}>{children}</ControlsContext>
    </ListeningContext>
  );
}

/** The panel's own sound; the same object while nothing that is heard changes. */
function useOwnSound(table: TableAnswer, playback: Playback, onBoard: OnBoard | null): Sound {
  const { cycle, values, codes, definition } = table;
  const { range, cycles, length } = definition.table;
  const { mode, by, toneHz, sampleRateHz, accumulator } = playback;
  const drive = useMemo(
    () => driveOf({ mode, by, toneHz, sampleRateHz, accumulator }, { length, cycles }),
    [mode, by, toneHz, sampleRateHz, accumulator, length, cycles],
  );
  const plain = useMemo(
    () => tableSound({ cycle, values, range, tableCycles: cycles, drive }),
    [cycle, values, range, cycles, drive],
  );
  const voices = useMemo(
    () => (onBoard === null ? null : boardVoices(onBoard, codes, cycles)),
    [onBoard, codes, cycles],
  );
  return useMemo(
    (): Sound => (voices === null ? plain : { ...plain, voices: { ...plain.voices, ...voices } }),
    [plain, voices],
  );
}

/** Levels of a board in signal units, by the line of engine specification §3.4 from its lowest to its highest. */
function boardVoices({ volts, stage }: OnBoard, codes: ArrayLike<number>, cycles: number) {
  let low = Infinity;
  let high = -Infinity;
  for (const level of volts) {
    low = Math.min(low, level);
    high = Math.max(high, level);
  }
  const values = new Float64Array(codes.length);
  for (let k = 0; k < codes.length; k += 1) values[k] = (2 * (volts[codes[k]] - low)) / (high - low) - 1;
  const ladder: Voice = { values, cycles, form: 'staircase' };
  return { ladder, output: { ...ladder, stage } };
}
