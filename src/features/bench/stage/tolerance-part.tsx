import { useState } from 'react';
import type { Ladder, LadderOutput } from '../../../../shared/contract/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, Explain, NumberField } from '../../../components/index.ts';
import type { StageJob } from '../../../workers/stage-messages.ts';
import { Fault } from './fault.tsx';
import { useStage } from './use-stage.ts';

const trials = 2000;

/** The tolerance that a wanted yield needs. */
export function TolerancePart({ output, ladder }: { output: LadderOutput; ladder: Ladder }) {
  const [percent, setPercent] = useState(99);
  const [asked, setAsked] = useState<(StageJob & { kind: 'tolerance' }) | null>(null);
  const { answer, fault, isBusy } = useStage('tolerance', asked);
  const { distribution } = output;
  const isRunning = asked !== null && isBusy;
  const isCurrent = asked !== null && asked.ladder === ladder && asked.share === percent / 100 && !isBusy;
  return (
    <section className="space-y-2">
      <h3 className="flex items-center gap-2">
        Tolerance for a yield
        <Explain title="Tolerance for a yield">
          <p>
            The widest tolerance at which that share of {trials.toLocaleString('en')} ladders, drawn with seed
            1, rises at every step; and the widest of the marked tolerances of IEC 60062 that does.
          </p>
        </Explain>
      </h3>
      <NumberField
        label="Wanted yield"
        unit="%"
        min={1}
        max={100}
        allowed="a number of percent from 1 to 100"
        value={percent}
        onChange={setPercent}
      />
      <Button
        size="small"
        isDisabled={isRunning}
        disabledReason="It is under way"
        onPress={() =>
          setAsked({
            kind: 'tolerance',
            ladder,
            share: percent / 100,
            settings: { distribution, seed: 1, trials },
          })
        }
      >
        {isRunning ? 'Searching…' : 'Find the tolerance'}
      </Button>
      <Fault of="tolerance" fault={fault} />
      {answer !== null && isCurrent && (
        <p role="status">
          {answer.tolerancePercent === null
            ? 'None does: even exact resistors do not rise at every step with these pin resistances.'
            : `±${say(answer.tolerancePercent)} keeps ${percent} % of ladders rising. ${
                answer.markedPercent === null
                  ? 'No marked tolerance does.'
                  : `Buy resistors of ±${say(answer.markedPercent)}.`
              }`}
        </p>
      )}
    </section>
  );
}

const say = (percent: number) => formatQuantity(percent, '%', { significant: 3 });
