import { useMemo } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import type { StageJob } from '../../../workers/stage-messages.ts';
import { BitsFit } from './bits-fit.tsx';
import { Fact, Facts, Verdict } from './fact.tsx';
import { Fault } from './fault.tsx';
import { usePlayed } from './use-played.ts';
import { useStage } from './use-stage.ts';

/** Whether the op-amp keeps up with the table at its rate. */
export function OpAmpPart({ board }: { board: Board }) {
  const played = usePlayed();
  const hasOpAmp = board.stage.opAmp !== undefined;
  const fits = played !== null && played.table.bits === board.output.bits;
  const job = useMemo(
    (): (StageJob & { kind: 'playing' }) | null =>
      hasOpAmp && fits ? { kind: 'playing', board, played } : null,
    [hasOpAmp, fits, board, played],
  );
  const { answer, fault } = useStage('playing', job);
  const opAmp = answer?.opAmp ?? null;
  return (
    <section className="space-y-2">
      <h3>Whether the op-amp follows</h3>
      {!hasOpAmp && <p>No op-amp follows on this board.</p>}
      {hasOpAmp && <BitsFit bits={board.output.bits} />}
      <Fault of="answer" fault={fault} />
      {fits && opAmp !== null && (
        <Facts label="The op-amp">
          <Fact
            name="Steps settle"
            is={
              <Verdict isKept={opAmp.stepsSettle}>
                {`${q(opAmp.slewTimeS + opAmp.settleTimeS, 's')} of ${q(opAmp.holdS, 's')}`}
              </Verdict>
            }
          >
            <p>
              The largest step, {q(Math.abs(opAmp.largestStep.volts), 'V')}, takes {q(opAmp.slewTimeS, 's')}{' '}
              at the slew rate, and then <code>ln(2^(b+1))/(2π·GBW)</code> until it is within ½ LSB. Both must
              fit into one sample.
            </p>
          </Fact>
          <Fact
            name="Tone at full swing"
            is={<Verdict isKept={opAmp.toneFits}>{`up to ${q(opAmp.fullPowerBandwidthHz, 'Hz')}`}</Verdict>}
          >
            <p>
              The full-power bandwidth <code>SR/(2π·Vp)</code>: above it a sine of this height becomes a
              triangle.
            </p>
          </Fact>
          <Fact
            name="Loss at the tone"
            is={opAmp.toneDb > -0.005 ? 'under 0.01 dB' : formatQuantity(opAmp.toneDb, 'dB', { decimals: 2 })}
          >
            <p>What one pole at the gain-bandwidth product takes off.</p>
          </Fact>
        </Facts>
      )}
    </section>
  );
}

const q = (value: number, unit: string) => formatQuantity(value, unit, { significant: 4 });
