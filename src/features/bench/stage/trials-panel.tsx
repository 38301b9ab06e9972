import './stage.css';
import { useEffect, useMemo, useRef, useState } from 'react';
import {
  limits,
  outputLimits,
  type Board,
  type Distribution,
  type Ladder,
  type LadderOutput,
} from '../../../../shared/contract/index.ts';
import { ladderOf, type Histogram } from '../../../../shared/output-stage/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, ChoiceField, NumberField } from '../../../components/index.ts';
import { startStage, type StageRun } from '../../../workers/stage-client.ts';
import type { Played, TrialsAnswer } from '../../../workers/stage-messages.ts';
import { Fact, Facts } from './fact.tsx';
import { OnStageBoard } from './on-stage-board.tsx';
import { Fault } from './fault.tsx';
import { TracesPlot } from './traces-plot.tsx';
import type { TracesData } from './traces-scene.ts';
import { usePlayed } from './use-played.ts';

const distributions = [
  { value: 'uniform', label: 'Uniform', hint: 'Anywhere within the tolerance, all values alike.' },
  { value: 'normal', label: 'Normal', hint: 'Normally spread, the tolerance being 3σ.' },
] as const;

/** Many ladders built by chance from resistors within their tolerance. */
export function TrialsPanel() {
  return (
    <OnStageBoard>
      {(board) => {
        const ladder = ladderOf(board);
        return board.output.kind === 'ladder' && ladder !== null ? (
          <Trying board={board} output={board.output} ladder={ladder} />
        ) : (
          <p>Tolerance trials are for R-2R ladders; the output of this board is none.</p>
        );
      }}
    </OnStageBoard>
  );
}

interface TryingProps {
  board: Board;
  output: LadderOutput;
  ladder: Ladder;
}

function Trying({ output, ladder }: TryingProps) {
  const [trials, setTrials] = useState(2000);
  const [seed, setSeed] = useState(1);
  const [ownTolerance, setTolerance] = useState<number | null>(null);
  const [ownDistribution, setDistribution] = useState<Distribution | null>(null);
  const tolerancePercent = ownTolerance ?? output.tolerancePercent;
  const distribution = ownDistribution ?? output.distribution;
  const mostPercent = distribution === 'normal' ? outputLimits.normalTolerancePercent : 99;
  const played = usePlayed();
  const table = played !== null && played.table.bits === output.bits ? played : null;
  const { state, start, stop } = useTrials();
  const isSound = tolerancePercent <= mostPercent;
  return (
    <>
      <p className="field-description">
        Each trial draws every resistor of the ladder anew and measures what comes of it
        {table === null ? '.' : ', with the table on the bench played through it.'}
      </p>
      <div className="field-pair">
        <NumberField
          label="Trials"
          isInteger
          {...outputLimits.trials}
          step={1000}
          allowed={`a whole number from ${outputLimits.trials.min} to ${outputLimits.trials.max}`}
          value={trials}
          onChange={setTrials}
        />
        <NumberField
          label="Seed"
          isInteger
          {...limits.seed}
          allowed={`a whole number from ${limits.seed.min} to ${limits.seed.max}`}
          description="The same seed draws the same ladders."
          value={seed}
          onChange={setSeed}
        />
        <NumberField
          label="Tolerance"
          unit="%"
          min={0}
          max={mostPercent}
          allowed={`a number of percent from 0 to ${mostPercent}`}
          value={tolerancePercent}
          onChange={setTolerance}
          problem={isSound ? undefined : `At most ${mostPercent} % where resistors are spread normally.`}
        />
        <ChoiceField
          label="Resistors"
          value={distribution}
          options={distributions}
          onChange={(next: Distribution) => setDistribution(next)}
        />
      </div>
      <div className="flex flex-wrap gap-2">
        {state.isRunning ? (
          <Button size="small" onPress={stop}>
            Stop the trials
          </Button>
        ) : (
          <Button
            size="small"
            variant="primary"
            isDisabled={!isSound}
            disabledReason="The tolerance is not allowed."
            onPress={() => start(ladder, { trials, seed, tolerancePercent, distribution }, table)}
          >
            Run the trials
          </Button>
        )}
      </div>
      <Fault of="trials" fault={state.fault} />
      {state.answer !== null && <Results answer={state.answer} isRunning={state.isRunning} />}
    </>
  );
}

interface TrialsState {
  readonly answer: TrialsAnswer | null;
  readonly fault: string | null;
  readonly isRunning: boolean;
}

function useTrials() {
  const [state, setState] = useState<TrialsState>({ answer: null, fault: null, isRunning: false });
  const run = useRef<StageRun | null>(null);
  const end = () => {
    run.current?.stop();
    run.current = null;
  };
  useEffect(() => end, []);
  return {
    state,
    start(
      ladder: Ladder,
      settings: { trials: number; seed: number; tolerancePercent: number; distribution: Distribution },
      played: Played | null,
    ) {
      end();
      setState({ answer: null, fault: null, isRunning: true });
      const table = played && { codes: played.codes, cycle: played.cycle, range: played.table.range };
      run.current = startStage((message) => {
        if (message.kind === 'trials') {
          if (message.isDone) end();
          setState({ answer: message, fault: null, isRunning: !message.isDone });
        } else if (message.kind === 'failed') {
          end();
          setState({ answer: null, fault: message.message, isRunning: false });
        }
      });
      run.current.ask({ kind: 'trials', ladder, settings, table });
    },
    stop() {
      end();
      setState((before) => ({ ...before, isRunning: false }));
    },
  };
}

function Results({ answer, isRunning }: { answer: TrialsAnswer; isRunning: boolean }) {
  const { summary } = answer;
  const { done, trials, monotonicShare, maxInl, maxDnl, sinadDb, unwantedDb } = summary;
  const lsb = ({ p50, p95, p99 }: typeof maxInl) => [p50, p95, p99].map((value) => n(value)).join(' · ');
  const dnl = useMemo(() => histogramData('Largest |DNL|', 'LSB', answer.maxDnl), [answer]);
  const inl = useMemo(() => histogramData('Largest |INL|', 'LSB', answer.maxInl), [answer]);
  const sinad = useMemo(() => answer.sinadDb && histogramData('SINAD', 'dB', answer.sinadDb), [answer]);
  return (
    <>
      <div>
        <progress className="stage-bar" max={trials} value={done} aria-label="Trials done" />
        <p className="figure-note" role={isRunning ? undefined : 'status'}>
          {done.toLocaleString('en')} of {trials.toLocaleString('en')} ladders
          {isRunning ? ' …' : done < trials ? ', stopped.' : ', done.'}
        </p>
      </div>
      <Facts label="Figures over the trials">
        <Fact
          name="Yield"
          is={monotonicShare === null ? '–' : formatQuantity(100 * monotonicShare, '%', { significant: 4 })}
        >
          <p>Share of ladders in which every step rises.</p>
        </Fact>
        <Fact name="|INL|, 50 · 95 · 99 %, LSB" is={lsb(maxInl)}>
          <p>What that share of ladders does not exceed, by nearest rank.</p>
        </Fact>
        <Fact name="|DNL|, 50 · 95 · 99 %, LSB" is={lsb(maxDnl)}>
          <p>
            What that share of ladders does not exceed, by nearest rank. Above 1 LSB a step may fall back.
          </p>
        </Fact>
        {answer.sinadDb !== null && (
          <>
            <Fact
              name="SINAD, 50 · 95 · 99 %, dB"
              is={[sinadDb.p50, sinadDb.p5, sinadDb.p1].map((value) => n(value)).join(' · ')}
            >
              <p>What that share of ladders reaches with the table on the bench.</p>
            </Fact>
            <Fact name="Strongest unwanted line, dB" is={lsb(unwantedDb)}>
              <p>Against the strongest wanted line; what that share of ladders does not exceed.</p>
            </Fact>
          </>
        )}
      </Facts>
      <TracesPlot title="Ladders by largest |DNL|" kind="trials" data={dnl} />
      <TracesPlot title="Ladders by largest |INL|" kind="trials" data={inl} />
      {sinad !== null && <TracesPlot title="Ladders by SINAD" kind="trials" data={sinad} />}
    </>
  );
}

function histogramData(name: string, unit: string, { from, to, counts }: Histogram): TracesData {
  const step = (to - from) / counts.length || 1e-6;
  const most = counts.reduce((best, count, index) => (count > counts[best] ? index : best), 0);
  return {
    traces: [
      { name: 'ladders', values: Float64Array.from(counts), color: 'water', width: 1.6, isStairs: true },
    ],
    from,
    step,
    x: { name, unit },
    y: { name: 'ladders', unit: '' },
    reach: [0, 1],
    summary: `${name} of the ladders lies from ${n(from)} to ${n(to)} ${unit}; most lie near ${n(from + (most + 0.5) * step)} ${unit}.`,
  };
}

const n = (value: number | null) => formatQuantity(value, '', { significant: 3 });
