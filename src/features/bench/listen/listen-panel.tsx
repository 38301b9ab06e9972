import './listen.css';
import { useState, type ReactNode } from 'react';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { later } from '../view/later.tsx';
import { ListeningProvider, useListenControls, useListening } from './listening.tsx';
import type { Playback } from './playback.ts';
import { PlayingFlag } from './playing-flag.tsx';

const ListenBody = later('the listening', async () => (await import('./listen-body.tsx')).ListenBody);

export interface ListenPanelProps {
  table: TableAnswer;
  playback: Playback;
  onPlaybackChange: (next: Playback) => void;
  /** On the bench, where a board is chosen and the wave can be changed; not on a read-only page. */
  isOnBench?: boolean;
  /** Until it is in sight for the first time, its fields are not loaded; the key that plays works from the start. */
  isInSight?: boolean;
}

/** Plays the wave in what stages it goes through. It starts with a press only, quietly, and shows how to stop. */
export function ListenPanel({
  table,
  playback,
  onPlaybackChange,
  isOnBench = false,
  isInSight = true,
}: ListenPanelProps) {
  const [wasInSight, setWasInSight] = useState(isInSight);
  if (isInSight && !wasInSight) setWasInSight(true);
  return (
    <ListeningProvider {...{ table, playback, onPlaybackChange, isOnBench, isInSight }} isNear={wasInSight}>
      <ListenSection>{wasInSight && <ListenBody />}</ListenSection>
    </ListeningProvider>
  );
}

function ListenSection({ children }: { children: ReactNode }) {
  const { status, toggle } = useListening();
  const { stopPlace } = useListenControls();
  return (
    <section className="listen" aria-label="Listen">
      {children}
      {status === 'playing' && <PlayingFlag stopPlace={stopPlace} onStop={toggle} />}
    </section>
  );
}
