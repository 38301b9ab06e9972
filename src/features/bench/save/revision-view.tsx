import '../bench.css';
import './save.css';
import { useMemo, useState } from 'react';
import type { Revision } from '../../../../shared/contract/index.ts';
import { Waiting } from '../../../components/index.ts';
import { Drawings } from '../drawings/drawings.tsx';
import { FigureStrips } from '../figures/figure-strips.tsx';
import { Warnings } from '../figures/warnings.tsx';
import { ListenPanel } from '../listen/index.ts';
import { useTable } from '../../../workers/use-table.ts';
import { sampleRateOf, type Playback } from '../state/wave.ts';
import { asStored } from '../../../workers/as-stored.ts';

/** How a wave is listened to that was saved without saying so. */
const plainPlayback: Playback = { mode: 'loop', by: 'tone', toneHz: 220, sampleRateHz: 32_000 };

/** A saved revision to see and hear, as it was stored. */
export function RevisionView({ revision }: { revision: Revision }) {
  const built = useTable(revision.definition);
  const [playback, setPlayback] = useState(revision.playback ?? plainPlayback);
  const table = useMemo(
    () => (built !== null && 'table' in built ? asStored(built.table, revision) : null),
    [built, revision],
  );
  if (built === null) return <Waiting>Building the table…</Waiting>;
  if (table === null) return <Waiting>{'fault' in built && built.fault}</Waiting>;
  return (
    <div className="revision-view">
      <div className="revision-plots">
        <Drawings table={table} sampleRateHz={sampleRateOf(playback, revision.definition.table)} />
        <Warnings warnings={table.warnings} />
        <FigureStrips table={table} />
      </div>
      <div className="panel">
        <ListenPanel table={table} playback={playback} onPlaybackChange={setPlayback} />
      </div>
    </div>
  );
}
