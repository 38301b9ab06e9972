import { useEffect, useRef, useState } from 'react';
import type { Definition, Revision } from '../../../shared/contract/index.ts';
import { sayProblem } from '../../../shared/contract/index.ts';
import { valuesOf } from '../../../shared/quantiser/index.ts';
import {
  sampleRateOfTone,
  tableSound,
  type AudioPreview,
  type Drive,
  type PreviewState,
  type Sound,
} from '../../audio/index.ts';
import { openPreview } from '../../audio/open-preview.ts';
import { readRevision } from '../../api/tables.ts';
import { createEngine } from '../../workers/engine-client.ts';
import type { TableAnswer } from '../../workers/engine-messages.ts';

/** A table of the list, as far as it is to be heard. */
export interface Playable {
  readonly slug: string;
  readonly title: string;
  readonly latestRevision: number;
}

export interface RowPlayer {
  /** The table that plays or is about to. */
  readonly playing: Playable | null;
  readonly status: PreviewState['status'] | 'fetching';
  /** What kept the sound away, and of which table. */
  readonly trouble: { readonly of: Playable; readonly words: string } | null;
  /** Starts a table, or stops it. Belongs in the handler of a press or a key. */
  readonly toggle: (table: Playable) => void;
  readonly stop: () => void;
}

/** Tone of a wave that was saved without saying how it is listened to, in hertz. */
const plainToneHz = 220;

/** Plays one table of the list at a time: what is saved of it, fetched and built once it is asked for. */
export function useRowPlayer(team: string): RowPlayer {
  const preview = useRef<AudioPreview | null>(null);
  const request = useRef(0);
  const [playing, setPlaying] = useState<Playable | null>(null);
  const [status, setStatus] = useState<RowPlayer['status']>('silent');
  const [trouble, setTrouble] = useState<RowPlayer['trouble']>(null);

  useEffect(
    () => () => {
      request.current += 1;
      preview.current?.close();
      preview.current = null;
    },
    [],
  );

  const stop = () => {
    request.current += 1;
    preview.current?.stop();
    setPlaying(null);
    setStatus('silent');
  };

  const start = async (table: Playable, own: number) => {
    const player = preview.current ?? (await openPreview());
    if (preview.current === null) {
      preview.current = player;
      player.subscribe(() => {
        const state = player.state();
        if (state.status !== 'silent') setStatus(state.status);
        else setPlaying((before) => (setStatus('silent'), before && null));
      });
    }
    const sound = await soundOf(await readRevision(team, table.slug, table.latestRevision));
    if (own !== request.current) return;
    await player.play(sound, 'table');
    const { trouble: words } = player.state();
    if (own === request.current && words !== null) setTrouble({ of: table, words });
  };

  const toggle = (table: Playable) => {
    if (playing?.slug === table.slug) return stop();
    const own = (request.current += 1);
    preview.current?.stop();
    setTrouble(null);
    setPlaying(table);
    setStatus('fetching');
    start(table, own).catch((error: unknown) => {
      if (own !== request.current) return;
      setPlaying(null);
      setStatus('silent');
      setTrouble({ of: table, words: error instanceof Error ? error.message : String(error) });
    });
  };
  return { playing, status, trouble, toggle, stop };
}

/** The stored codes as the pin gives them, by the settings they were listened to with. */
async function soundOf({ definition, codes, playback }: Revision): Promise<Sound> {
  const { cycle } = await build(definition);
  const { table } = definition;
  return tableSound({
    cycle,
    values: valuesOf(Uint16Array.from(codes), table),
    range: table.range,
    tableCycles: table.cycles,
    drive: driveOf(playback, table),
  });
}

function driveOf(playback: Revision['playback'], { length, cycles }: Definition['table']): Drive {
  const sampleRateHz =
    playback?.by === 'sampleRate'
      ? playback.sampleRateHz
      : sampleRateOfTone(playback?.toneHz ?? plainToneHz, { tableLength: length, tableCycles: cycles });
  const { mode = 'loop', accumulator } = playback ?? {};
  if (mode !== 'accumulator') return { kind: mode, sampleRateHz };
  // As on the bench: where the table is no longer one for an accumulator, it goes round.
  const indexBits = Math.log2(length);
  const isFit = accumulator !== undefined && Number.isInteger(indexBits);
  if (!isFit || accumulator.accumulatorBits < indexBits) return { kind: 'loop', sampleRateHz };
  return { kind: 'accumulator', sampleRateHz, ...accumulator };
}

const build = (definition: Definition): Promise<TableAnswer> =>
  new Promise((resolve, reject) => {
    const engine = createEngine((reply) => {
      engine.stop();
      if (reply.kind === 'built') resolve(reply.table);
      else reject(new Error(reply.kind === 'failed' ? reply.message : `${sayProblem(reply.problems[0])}.`));
    });
    engine.submit(definition);
  });
