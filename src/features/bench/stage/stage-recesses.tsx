import { later } from '../view/later.tsx';
import { Recess } from '../view/recess.tsx';
import { useBoardAt } from './chosen-board.ts';

const StagePanel = later('the output stage', async () => (await import('./stage-panel.tsx')).StagePanel);

/** What the board makes of the codes: a part of the output flight that opens in place. */
export function StageRecesses() {
  const { at } = useBoardAt();
  return (
    <div className="recesses">
      <Recess
        id="stage"
        title="Board and output stage"
        summary={at === null ? 'On an example board' : `On the board ${at.board}`}
      >
        <StagePanel />
      </Recess>
    </div>
  );
}
