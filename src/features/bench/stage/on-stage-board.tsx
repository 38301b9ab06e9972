import type { ReactNode } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import { ProblemNotice } from '../../../forms/problem-notice.tsx';
import { BoardField } from './board-field.tsx';
import { useStageBoard } from './use-stage-board.ts';

/** The choice of a board, and what is shown for it. */
export function OnStageBoard({ children }: { children: (board: Board) => ReactNode }) {
  const state = useStageBoard();
  return (
    <>
      <BoardField />
      {state.kind === 'waiting' && <p role="status">Reading the board…</p>}
      {state.kind === 'failed' && <ProblemNotice fault={state.problem} onTryAgain={state.tryAgain} />}
      {state.kind === 'there' && children(state.board)}
    </>
  );
}
