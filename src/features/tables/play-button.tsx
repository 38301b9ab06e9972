import { IconButton, icons } from '../../components/index.ts';
import type { Playable, RowPlayer } from './row-player.ts';

export function PlayButton({ player, table }: { player: RowPlayer; table: Playable }) {
  const isOn = player.playing?.slug === table.slug;
  return (
    <IconButton
      size="small"
      label={isOn ? `Stop ${table.title}` : `Play ${table.title}`}
      icon={isOn ? icons.stop : icons.play}
      onPress={() => player.toggle(table)}
    />
  );
}

/** Stays in sight while something sounds, wherever the list is scrolled to. */
export function PlayingBar({ player }: { player: RowPlayer }) {
  if (player.playing === null) return null;
  return (
    <div className="playing-bar" role="status">
      <icons.volume />
      <span className="grow">
        {player.status === 'playing' ? 'Playing' : 'Fetching'} <strong>{player.playing.title}</strong>
        {player.status === 'playing' ? ', quietly.' : '…'}
      </span>
      <button type="button" className="button button-primary button-small" onClick={player.stop}>
        <icons.stop width="16" height="16" />
        Stop
      </button>
    </div>
  );
}
