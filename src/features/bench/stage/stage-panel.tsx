import './stage.css';
import { useMemo } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import { Caution } from '../../../components/index.ts';
import type { StageJob } from '../../../workers/stage-messages.ts';
import { BitsFit } from './bits-fit.tsx';
import { Fault } from './fault.tsx';
import { LevelFacts } from './level-facts.tsx';
import { LevelTable } from './level-table.tsx';
import { OnStageBoard } from './on-stage-board.tsx';
import { LevelPlots, PlayingPlots } from './plots.tsx';
import { PlayingFacts } from './playing-facts.tsx';
import { usePlayed } from './use-played.ts';
import { useStage } from './use-stage.ts';

/** A board and what it makes of the table: volts over time, spectrum, linearity, currents. */
export function StagePanel() {
  return <OnStageBoard>{(board) => <OnBoard board={board} />}</OnStageBoard>;
}

function OnBoard({ board }: { board: Board }) {
  const levelsJob = useMemo((): StageJob & { kind: 'levels' } => ({ kind: 'levels', board }), [board]);
  const levels = useStage('levels', levelsJob);
  const played = usePlayed();
  const fits = played !== null && played.table.bits === board.output.bits;
  const playingJob = useMemo(
    (): (StageJob & { kind: 'playing' }) | null => (fits ? { kind: 'playing', board, played } : null),
    [fits, board, played],
  );
  const playing = useStage('playing', playingJob);
  const isCurrent = levels.answer?.volts.length === 2 ** board.output.bits;
  return (
    <>
      <Caution title="Pins and loudspeakers">
        The limits below are the board’s own figures. What a pin and a port may carry is an absolute maximum
        of the part’s data sheet: leave that to it and to a qualified engineer. This is for low voltages,
        never for the mains. DC through a loudspeaker needs a coupling capacitor in its way.
      </Caution>
      {/* Above what comes later: a press must not find that it has moved. */}
      <BitsFit bits={board.output.bits} />
      <Fault of="levels" fault={levels.fault} />
      {levels.answer !== null && isCurrent && <LevelFacts board={board} answer={levels.answer} />}
      <Fault of="wave at the output" fault={playing.fault} />
      {fits && playing.answer === null && playing.fault === null && (
        <p role="status">Computing what comes out…</p>
      )}
      {fits && playing.answer !== null && (
        <>
          <PlayingFacts board={board} answer={playing.answer} />
          <PlayingPlots board={board} answer={playing.answer} />
        </>
      )}
      {levels.answer !== null && isCurrent && (
        <>
          <LevelPlots answer={levels.answer} />
          <LevelTable answer={levels.answer} />
        </>
      )}
    </>
  );
}
