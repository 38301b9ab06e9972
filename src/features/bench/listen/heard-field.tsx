import { useEffect, useMemo } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import { boardVolts, stagePartsOf } from '../../../../shared/output-stage/index.ts';
import { exampleBoard } from '../../../boards/index.ts';
import { ChoiceField } from '../../../components/index.ts';
import { ProblemNotice } from '../../../forms/problem-notice.tsx';
import { BitsFit } from '../stage/bits-fit.tsx';
import { useBoardAt } from '../stage/chosen-board.ts';
import { useStageBoard } from '../stage/use-stage-board.ts';
import { useListenControls, useListening, type Heard, type OnBoard } from './listening.tsx';

/** How far through its stages the wave is heard. */
export function HeardField() {
  const { isOnBench } = useListenControls();
  return isOnBench ? <HeardOnBench /> : <HeardOfTable />;
}

const ofTable = [
  { value: 'ideal', label: 'Ideal curve' },
  { value: 'table', label: 'Quantised table' },
] as const;

const hints: Readonly<Record<Heard, string>> = {
  ideal: 'The wave before it was quantised, as a smooth curve.',
  table: 'What the codes stand for, as the steps that a pin holds.',
  ladder: 'The steps by the levels of the board.',
  output: 'The board’s levels behind its op-amp and filter.',
};

function HeardOfTable() {
  const { hearing } = useListening();
  const { hear } = useListenControls();
  return (
    <ChoiceField
      label="Heard"
      hideLabel
      value={hearing}
      options={ofTable}
      onChange={hear}
      description={hints[hearing]}
    />
  );
}

function HeardOnBench() {
  const { table, hearing } = useListening();
  const { hear, setOnBoard } = useListenControls();
  const { at } = useBoardAt();
  const state = useStageBoard();
  const tableBits = table.definition.table.bits;
  const chosen = state.kind === 'there' ? state.board : null;
  const hasChosen = at !== null;
  // The example has as many bits as the table that sounds; that on the bench may still be on its way.
  const board = useMemo(() => (hasChosen ? chosen : exampleBoard(tableBits)), [hasChosen, chosen, tableBits]);
  const onBoard = useMemo(() => (board === null ? null : levelsOf(board)), [board]);
  useEffect(() => {
    setOnBoard(onBoard);
    return () => setOnBoard(null);
  }, [onBoard, setOnBoard]);

  const boardBits = board?.output.bits;
  const isHeard = onBoard !== null && boardBits === tableBits;
  const isLadder = board === null || board.output.kind === 'ladder';
  const name = hasChosen ? board?.name : 'an example board, its figures made up';
  return (
    <div className="listen-heard">
      <ChoiceField
        label="Heard"
        hideLabel
        value={hearing}
        options={[
          ...ofTable,
          {
            value: 'ladder',
            label: isLadder ? 'Through the ladder' : 'Through the converter',
            isDisabled: !isHeard,
          },
          { value: 'output', label: 'After the output stage', isDisabled: !isHeard },
        ]}
        onChange={hear}
        description={
          isHeard ? (
            <>
              {hints[hearing]}
              {(hearing === 'ladder' || hearing === 'output') && <> Board: {name}.</>}
            </>
          ) : (
            <>
              {hints[hearing]} {whyNot()}
            </>
          )
        }
      />
      {state.kind === 'failed' && <ProblemNotice fault={state.problem} onTryAgain={state.tryAgain} />}
      {hasChosen && boardBits !== undefined && boardBits !== tableBits && <BitsFit bits={boardBits} />}
    </div>
  );

  function whyNot(): string {
    if (state.kind === 'waiting') return 'The board is being read.';
    if (state.kind === 'failed') return 'The board could not be read, so nothing of it can be heard.';
    const why = boardBits === tableBits ? 'all its levels are the same' : 'its bits are not the table’s';
    return `Nothing of ${board?.name} can be heard: ${why}.`;
  }
}

/** Null where every code gives the same level: then there is no line from lowest to highest. */
function levelsOf(board: Board): OnBoard | null {
  const volts = boardVolts(board);
  if (volts.every((level) => level === volts[0])) return null;
  return { board, volts, stage: stagePartsOf(board) };
}
