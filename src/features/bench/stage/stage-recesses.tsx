import { later } from '../view/later.tsx';
import { Recess } from '../view/recess.tsx';
import { useBoardAt } from './chosen-board.ts';

const StagePanel = later('the output stage', async () => (await import('./stage-panel.tsx')).StagePanel);
const TrialsPanel = later(
  'the tolerance trials',
  async () => (await import('./trials-panel.tsx')).TrialsPanel,
);
const AdvicePanel = later('the advice', async () => (await import('./advice-panel.tsx')).AdvicePanel);
const FitPanel = later('the fit', async () => (await import('./fit-panel.tsx')).FitPanel);

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
      <Recess id="fit" title="Fit to measured levels" summary="Codes for the converter as it was built">
        <FitPanel />
      </Recess>
      <Recess id="trials" title="Tolerance trials" summary="Many ladders built by chance">
        <TrialsPanel />
      </Recess>
      <Recess id="advice" title="Values and parts" summary="Resistors, tolerance, op-amp, bits">
        <AdvicePanel />
      </Recess>
    </div>
  );
}
