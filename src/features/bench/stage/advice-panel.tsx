import './stage.css';
import type { Board, Ladder } from '../../../../shared/contract/index.ts';
import { ladderOf } from '../../../../shared/output-stage/index.ts';
import { BitsPart } from './bits-part.tsx';
import { OnStageBoard } from './on-stage-board.tsx';
import { OpAmpPart } from './op-amp-part.tsx';
import { TolerancePart } from './tolerance-part.tsx';
import { ValuesPart } from './values-part.tsx';

/** What to buy, and what is enough. */
export function AdvicePanel() {
  return <OnStageBoard>{(board) => <Parts board={board} ladder={ladderOf(board)} />}</OnStageBoard>;
}

function Parts({ board, ladder }: { board: Board; ladder: Ladder | null }) {
  return (
    <>
      {board.output.kind === 'ladder' && ladder !== null && (
        <>
          <ValuesPart output={board.output} />
          <TolerancePart output={board.output} ladder={ladder} />
        </>
      )}
      <OpAmpPart board={board} />
      {board.output.kind === 'ladder' && ladder !== null && (
        <BitsPart board={board} output={board.output} ladder={ladder} />
      )}
    </>
  );
}
