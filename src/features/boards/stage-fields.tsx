import type { ReactNode } from 'react';
import { limits, outputLimits, type Board } from '../../../shared/contract/index.ts';
import { Button, Panel, SelectField } from '../../components/index.ts';
import type { ChangeBoard } from './draft.ts';
import { BoundedField, OptionalField } from './fields.tsx';
import { ListField } from './list-field.tsx';
import type { ProblemAt } from './use-board-form.ts';

interface StageFieldsProps {
  board: Board;
  change: ChangeBoard;
  at: ProblemAt;
  /** Stands before the flash. */
  children: ReactNode;
}

/** What follows the converter, and what makes its rate. */
export function StageFields({ board, change, at, children }: StageFieldsProps) {
  const { stage, clock, timer, flashBytes, levels } = board;
  const setStage = (part: Partial<Board['stage']>) =>
    change((before) => ({ ...before, stage: { ...before.stage, ...part } }));
  return (
    <>
      <Panel title="Load and buffer">
        <div className="field-pair">
          <OptionalField
            asks="A load is connected"
            label="Load"
            unit="Ω"
            bounds={outputLimits.ohms}
            value={stage.load}
            first={10_000}
            onChange={(load) =>
              change(({ stage: { load: _before, ...others }, ...before }) => ({
                ...before,
                stage: load === undefined ? others : { ...others, load },
              }))
            }
            description="From the output to the low rail; behind the op-amp where there is one."
          />
          <BoundedField
            label="Capacitance at the converter"
            unit="F"
            bounds={outputLimits.farads}
            value={stage.outputCapacitanceF}
            onChange={(outputCapacitanceF) => setStage({ outputCapacitanceF })}
          />
          <BoundedField
            label="Rising edges later by"
            unit="s"
            bounds={outputLimits.edgeSkewS}
            value={stage.edgeSkewS}
            onChange={(edgeSkewS) => setStage({ edgeSkewS })}
            description="Than falling ones; below 0 they come earlier."
          />
          <OpAmpFields {...{ board, change }} />
        </div>
      </Panel>
      <Panel title="Filter">
        <div className="field-pair">
          <SelectField
            label="Low-pass"
            value={stage.filter.kind}
            options={[
              { value: 'none', label: 'None' },
              { value: 'rc', label: 'First-order RC' },
              { value: 'butterworth', label: 'Second-order Butterworth' },
            ]}
            onChange={(kind) => {
              const cutoffHz = stage.filter.kind === 'none' ? 10_000 : stage.filter.cutoffHz;
              setStage({ filter: kind === 'none' ? { kind } : { kind, cutoffHz } });
            }}
          />
          {stage.filter.kind !== 'none' && (
            <BoundedField
              label="Cut-off"
              unit="Hz"
              bounds={outputLimits.hertz}
              value={stage.filter.cutoffHz}
              onChange={(cutoffHz) => {
                if (stage.filter.kind !== 'none') setStage({ filter: { kind: stage.filter.kind, cutoffHz } });
              }}
              description="Where it takes 3.01 dB off."
            />
          )}
        </div>
      </Panel>
      <Panel title="Clock and timer">
        <div className="field-pair">
          <BoundedField
            label="Clock"
            unit="Hz"
            bounds={outputLimits.hertz}
            value={clock.hz}
            onChange={(hz) => change((before) => ({ ...before, clock: { ...before.clock, hz } }))}
          />
          <BoundedField
            label="Tolerance of the clock"
            unit="ppm"
            bounds={outputLimits.clockTolerancePpm}
            value={clock.tolerancePpm}
            onChange={(tolerancePpm) =>
              change((before) => ({ ...before, clock: { ...before.clock, tolerancePpm } }))
            }
          />
          <ListField
            label="Prescalers of the timer"
            unit=""
            value={timer.prescalers}
            onChange={(prescalers) =>
              change((before) => ({ ...before, timer: { ...before.timer, prescalers: prescalers ?? [] } }))
            }
            description="Parted by blanks."
            problem={at('timer.prescalers')}
          />
          <BoundedField
            label="Compare register"
            unit="bits"
            isInteger
            bounds={outputLimits.compareBits}
            value={timer.compareBits}
            onChange={(compareBits) =>
              change((before) => ({ ...before, timer: { ...before.timer, compareBits } }))
            }
          />
        </div>
      </Panel>
      {children}
      <Panel title="Flash">
        <OptionalField
          asks="Tables have only so much of it"
          label="Flash for tables"
          unit="bytes"
          isInteger
          bounds={outputLimits.flashBytes}
          value={flashBytes}
          first={8192}
          onChange={(bytes) =>
            change(({ flashBytes: _before, ...before }) =>
              bytes === undefined ? before : { ...before, flashBytes: bytes },
            )
          }
        />
      </Panel>
      {levels !== undefined && (
        <Panel title="Measured levels">
          <p>
            {levels.length} voltages were measured at this board; up to 2^{limits.bits.max} are taken.{' '}
            {at('levels')}
          </p>
          <div>
            <Button size="small" onPress={() => change(({ levels: _gone, ...before }) => before)}>
              Clear the measured levels
            </Button>
          </div>
        </Panel>
      )}
    </>
  );
}

function OpAmpFields({ board: { stage }, change }: Pick<StageFieldsProps, 'board' | 'change'>) {
  const { opAmp } = stage;
  const set = (next: Board['stage']['opAmp']) =>
    change(({ stage: { opAmp: _before, ...others }, ...before }) => ({
      ...before,
      stage: next === undefined ? others : { ...others, opAmp: next },
    }));
  return (
    <>
      <OptionalField
        asks="An op-amp follows"
        label="Slew rate of the op-amp"
        unit="V/s"
        bounds={outputLimits.slewRateVPerS}
        value={opAmp?.slewRateVPerS}
        first={500_000}
        onChange={(slewRateVPerS) =>
          set(
            slewRateVPerS === undefined
              ? undefined
              : { gainBandwidthHz: opAmp?.gainBandwidthHz ?? 1e6, slewRateVPerS },
          )
        }
        description="0.5 V/µs is 500k."
      />
      {opAmp !== undefined && (
        <BoundedField
          label="Gain-bandwidth product"
          unit="Hz"
          bounds={outputLimits.hertz}
          value={opAmp.gainBandwidthHz}
          onChange={(gainBandwidthHz) => set({ ...opAmp, gainBandwidthHz })}
        />
      )}
    </>
  );
}
