import { useMemo, useState } from 'react';
import type { Board, Ladder, LadderOutput } from '../../../../shared/contract/index.ts';
import type { BitsThatMatter } from '../../../../shared/output-stage/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, Explain } from '../../../components/index.ts';
import type { StageJob } from '../../../workers/stage-messages.ts';
import { useCalmTable } from '../state/tables.ts';
import { Fault } from './fault.tsx';
import { TracesPlot } from './traces-plot.tsx';
import type { TracesData } from './traces-scene.ts';
import { usePlayed } from './use-played.ts';
import { useStage } from './use-stage.ts';

const trials = 50;
/** SINAD so far below SNR is the wave’s own partials, in dB. */
const partialsDb = 6;

interface BitsPartProps {
  board: Board;
  output: LadderOutput;
  ladder: Ladder;
}

/** SINAD against the bits of the ladder: how many still matter behind these resistors. */
export function BitsPart({ board, output, ladder }: BitsPartProps) {
  const table = useCalmTable();
  const played = usePlayed();
  const [asked, setAsked] = useState<(StageJob & { kind: 'bits' }) | null>(null);
  const { answer, fault, isBusy } = useStage('bits', asked);
  const { snrDb = null, sinadDb = null } = table?.report ?? {};
  const isOfPartials = snrDb !== null && (sinadDb === null || snrDb - sinadDb > partialsDb);
  const isRunning = asked !== null && isBusy;
  const isCurrent =
    asked !== null &&
    !isBusy &&
    asked.ladder === ladder &&
    asked.definition === table?.definition &&
    asked.sampleRateHz === played?.sampleRateHz;
  return (
    <section className="space-y-2">
      <h3 className="flex items-center gap-2">
        How many bits matter
        <Explain title="How many bits matter">
          <p>
            The wave is quantised at 1 to 16 bits and played through {trials} ladders of each, drawn within ±
            {output.tolerancePercent} % with seed 1, behind hold and filter. The curve flattens where
            resistors and not rounding decide; enough is what comes within 1 dB of the best.
          </p>
        </Explain>
      </h3>
      {isOfPartials && (
        <p className="figure-note">
          The wave has partials of its own, which SINAD counts as distortion: put a single tone on the bench
          for this curve.
        </p>
      )}
      <Button
        size="small"
        isDisabled={isRunning || isOfPartials || table === null || played === null}
        disabledReason={
          isRunning ? 'It is under way' : isOfPartials ? 'It is for a single tone' : 'No table is built yet'
        }
        onPress={() => {
          if (table === null || played === null) return;
          const { tolerancePercent, distribution } = output;
          setAsked({
            kind: 'bits',
            definition: table.definition,
            ladder,
            settings: { trials, seed: 1, tolerancePercent, distribution },
            filter: board.stage.filter,
            sampleRateHz: played.sampleRateHz,
          });
        }}
      >
        {isRunning ? 'Computing…' : 'Compute the curve'}
      </Button>
      <Fault of="curve" fault={fault} />
      {answer !== null && isCurrent && <Curve answer={answer} />}
    </section>
  );
}

function Curve({ answer }: { answer: BitsThatMatter }) {
  const data = useMemo(() => curveOf(answer), [answer]);
  return (
    <>
      <p role="status">
        {answer.enough === null
          ? 'There is no SINAD: the wave has no single strongest line.'
          : `${answer.enough} ${answer.enough === 1 ? 'bit is' : 'bits are'} enough; more add less than 1 dB.`}
      </p>
      {answer.enough !== null && <TracesPlot title="SINAD against bits" kind="bits" data={data} />}
    </>
  );
}

function curveOf({ byBits }: BitsThatMatter): TracesData {
  const value = (db: number | null) => db ?? 0;
  const last = byBits[byBits.length - 1];
  const n = (db: number | null) => formatQuantity(db, 'dB', { decimals: 1 });
  return {
    traces: [
      {
        name: 'codes alone',
        values: Float64Array.from(byBits, ({ codesDb }) => value(codesDb)),
        color: 'ink',
        width: 1.2,
        dash: [5, 3],
      },
      {
        name: 'at the output',
        values: Float64Array.from(byBits, ({ outputDb }) => value(outputDb)),
        color: 'water',
        width: 2,
      },
    ],
    from: byBits[0].bits,
    step: 1,
    x: { name: 'bits', unit: '' },
    y: { name: 'SINAD', unit: 'dB' },
    summary: `SINAD from ${byBits[0].bits} to ${last.bits} bits; at ${last.bits} bits ${n(last.codesDb)} by the codes alone and ${n(last.outputDb)} at the output.`,
  };
}
