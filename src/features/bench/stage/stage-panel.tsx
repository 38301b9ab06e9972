import './stage.css';
import { useMemo } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import { Button, Caution, Notice } from '../../../components/index.ts';
import { ProblemNotice } from '../../../forms/problem-notice.tsx';
import type { StageJob } from '../../../workers/stage-messages.ts';
import { changeDefinition, useDefinition } from '../state/use-bench.ts';
import { BoardField } from './board-field.tsx';
import { LevelFacts } from './level-facts.tsx';
import { LevelTable } from './level-table.tsx';
import { LevelPlots, PlayingPlots } from './plots.tsx';
import { PlayingFacts } from './playing-facts.tsx';
import { usePlayed } from './use-played.ts';
import { useStage } from './use-stage.ts';
import { useStageBoard } from './use-stage-board.ts';

/** A board and what it makes of the table: volts over time, spectrum, linearity, currents. */
export function StagePanel() {
  const state = useStageBoard();
  return (
    <>
      <BoardField />
      {state.kind === 'waiting' && <p role="status">Reading the board…</p>}
      {state.kind === 'failed' && <ProblemNotice fault={state.problem} onTryAgain={state.tryAgain} />}
      {state.kind === 'there' && <OnBoard board={state.board} />}
    </>
  );
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
      <Fault of="levels" fault={levels.fault} />
      {levels.answer !== null && isCurrent && <LevelFacts board={board} answer={levels.answer} />}
      <BitsFit boardBits={board.output.bits} />
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

export function Fault({ of, fault }: { of: string; fault: string | null }) {
  if (fault === null) return null;
  return (
    <Notice tone="fault">
      The {of} could not be computed: {fault}
    </Notice>
  );
}

/** Says where table and board have different bits, and offers the board's. */
export function BitsFit({ boardBits }: { boardBits: number }) {
  const tableBits = useDefinition(({ table }) => table.bits);
  if (tableBits === boardBits) return null;
  const say = (bits: number) => `${bits} ${bits === 1 ? 'bit' : 'bits'}`;
  return (
    <div className="reasons">
      <p>
        The board takes codes of {say(boardBits)}; the table has {say(tableBits)}.
      </p>
      <Button
        size="small"
        onPress={() =>
          changeDefinition(({ table: { levels: _gone, ...table }, ...definition }) => ({
            ...definition,
            table: { ...table, bits: boardBits },
          }))
        }
      >
        Use {say(boardBits)}
      </Button>
    </div>
  );
}
