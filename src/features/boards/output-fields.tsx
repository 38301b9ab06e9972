import type { ReactNode } from 'react';
import {
  outputLimits,
  type Board,
  type BoardOutput,
  type LadderOutput,
} from '../../../shared/contract/index.ts';
import { Caution, Panel, SelectField } from '../../components/index.ts';
import { withBits, type ChangeBoard } from './draft.ts';
import { BoundedField, OptionalField } from './fields.tsx';
import { HexField } from './hex-field.tsx';
import { ListField } from './list-field.tsx';
import type { ProblemAt } from './use-board-form.ts';

interface OutputFieldsProps {
  board: Board;
  change: ChangeBoard;
  at: ProblemAt;
}

/** Settings of the converter, whichever kind it is. */
export function OutputFields({ board, change, at }: OutputFieldsProps) {
  const { output } = board;
  const set = (part: Partial<BoardOutput>) =>
    change((before) => ({ ...before, output: { ...before.output, ...part } as BoardOutput }));
  const bits = (
    <BoundedField
      label="Bits"
      unit="bits"
      isInteger
      bounds={outputLimits.bits}
      value={output.bits}
      onChange={(next) =>
        set(
          output.kind === 'ladder' ? { bits: next, portMap: withBits(output.portMap, next) } : { bits: next },
        )
      }
      problem={at('output.bits')}
    />
  );
  const ohms = output.kind !== 'ladder' && (
    <BoundedField
      label="Output resistance"
      unit="Ω"
      bounds={{ min: 0, max: outputLimits.ohms.max }}
      value={output.outputOhms}
      onChange={(outputOhms) => set({ outputOhms })}
    />
  );
  switch (output.kind) {
    case 'ladder':
      return (
        <>
          <LadderFields {...{ output, set, at }} bits={bits} />
          <PinFields {...{ board, change, output, set }} />
        </>
      );
    case 'on-chip':
      return (
        <Panel title="Converter">
          <div className="field-pair">
            {bits}
            <SelectField
              label="Data register"
              value={String(output.registerBits)}
              options={['8', '16', '32'].map((value) => ({ value, label: `${value} bits` }))}
              onChange={(value) => set({ registerBits: Number(value) as 8 | 16 | 32 })}
            />
            <SelectField
              label="Alignment"
              value={output.alignment}
              options={[
                { value: 'right', label: 'Right' },
                { value: 'left', label: 'Left' },
              ]}
              onChange={(alignment) => set({ alignment })}
            />
            {ohms}
          </div>
        </Panel>
      );
    case 'serial':
      return (
        <Panel title="Converter">
          <p className="quiet">
            The word is <code>command | ((code &lt;&lt; shift) &amp; mask)</code>.
          </p>
          <div className="field-pair">
            {bits}
            <SelectField
              label="Word"
              value={String(output.wordBits)}
              options={['8', '16', '24', '32'].map((value) => ({ value, label: `${value} bits` }))}
              onChange={(value) => set({ wordBits: Number(value) as 8 | 16 | 24 | 32 })}
            />
            <BoundedField
              label="Shift"
              isInteger
              bounds={{ min: 0, max: 31 }}
              value={output.shift}
              onChange={(shift) => set({ shift })}
              problem={at('output.shift')}
            />
            <HexField
              label="Mask"
              value={output.mask ?? codeBitsOf(output)}
              // The code's own bits need no saying: they follow bits and shift.
              onChange={(mask) => set({ mask: mask === codeBitsOf(output) ? undefined : mask })}
              problem={at('output.mask')}
            />
            <HexField
              label="Command bits"
              value={output.command}
              onChange={(command) => set({ command })}
              problem={at('output.command')}
            />
            <SelectField
              label="Byte order"
              value={output.byteOrder}
              options={[
                { value: 'big-endian', label: 'Most significant first' },
                { value: 'little-endian', label: 'Least significant first' },
              ]}
              onChange={(byteOrder) => set({ byteOrder })}
            />
            {ohms}
          </div>
        </Panel>
      );
    case 'pwm':
      return (
        <Panel title="Pulse width">
          <div className="field-pair">
            {bits}
            <SelectField
              label="Mode"
              value={output.mode}
              options={[
                { value: 'fast', label: 'Fast' },
                { value: 'phase-correct', label: 'Phase-correct' },
              ]}
              onChange={(mode) => set({ mode })}
            />
            <BoundedField
              label="Prescaler"
              isInteger
              bounds={outputLimits.prescaler}
              value={output.prescaler}
              onChange={(prescaler) => set({ prescaler })}
            />
            {ohms}
          </div>
        </Panel>
      );
  }
}

type Set = (part: Partial<BoardOutput>) => void;

function LadderFields({
  output,
  set,
  at,
  bits,
}: {
  output: LadderOutput;
  set: Set;
  at: ProblemAt;
  bits: ReactNode;
}) {
  const optional = (name: 'rungs' | 'series' | 'terminator', value: number[] | number | undefined) =>
    set({ [name]: value } as Partial<LadderOutput>);
  return (
    <Panel title="Ladder">
      <div className="field-pair">
        {bits}
        <BoundedField
          label="R"
          unit="Ω"
          bounds={outputLimits.ohms}
          value={output.R}
          onChange={(R) => set({ R })}
          description="Between nodes; rungs and terminator have 2R."
        />
        <BoundedField
          label="Tolerance of the resistors"
          unit="%"
          bounds={{ min: 0, max: 99.99 }}
          value={output.tolerancePercent}
          onChange={(tolerancePercent) => set({ tolerancePercent })}
          problem={at('output.tolerancePercent')}
        />
        <SelectField
          label="Resistors lie"
          value={output.distribution}
          options={[
            { value: 'uniform', label: 'Evenly within it' },
            { value: 'normal', label: 'Normally, it being 3σ' },
          ]}
          onChange={(distribution) => set({ distribution })}
        />
      </div>
      <details>
        <summary>Single resistors, where they are measured</summary>
        <div className="board-group">
          <ListField
            label="Rungs"
            unit="Ω"
            value={output.rungs}
            onChange={(rungs) => optional('rungs', rungs)}
            description={`From pin to node, bit 0 first: ${output.bits} of them, or nothing for 2R each.`}
            problem={at('output.rungs')}
          />
          <ListField
            label="Series resistors"
            unit="Ω"
            value={output.series}
            onChange={(series) => optional('series', series)}
            description={`From node to node, bit 0 first: ${output.bits - 1} of them, or nothing for R each.`}
            problem={at('output.series')}
          />
          <OptionalField
            asks="The terminator is not 2R"
            label="Terminator"
            unit="Ω"
            bounds={outputLimits.ohms}
            value={output.terminator}
            first={2 * output.R}
            onChange={(terminator) => optional('terminator', terminator)}
          />
        </div>
      </details>
    </Panel>
  );
}

function PinFields({
  board: { currents },
  change,
  output,
  set,
}: {
  board: Board;
  change: ChangeBoard;
  output: LadderOutput;
  set: Set;
}) {
  const ohms = { min: 0, max: outputLimits.ohms.max };
  const setCurrent = (name: 'pinAmps' | 'totalAmps', amps: number | undefined) =>
    change((before) => {
      const { [name]: _before, ...others } = before.currents;
      return { ...before, currents: amps === undefined ? others : { ...others, [name]: amps } };
    });
  return (
    <Panel title="Pins">
      <div className="field-pair">
        <BoundedField
          label="Resistance of a high pin"
          unit="Ω"
          bounds={ohms}
          value={output.rHigh}
          onChange={(rHigh) => set({ rHigh })}
        />
        <BoundedField
          label="Resistance of a low pin"
          unit="Ω"
          bounds={ohms}
          value={output.rLow}
          onChange={(rLow) => set({ rLow })}
        />
        <OptionalField
          asks="One pin has a limit"
          label="One pin, at most"
          unit="A"
          bounds={outputLimits.amps}
          value={currents.pinAmps}
          first={0.02}
          onChange={(amps) => setCurrent('pinAmps', amps)}
        />
        <OptionalField
          asks="All pins have a limit"
          label="All pins, at most"
          unit="A"
          bounds={outputLimits.amps}
          value={currents.totalAmps}
          first={0.1}
          onChange={(amps) => setCurrent('totalAmps', amps)}
        />
      </div>
      <Caution>
        These are absolute maxima of the part’s data sheet, for one pin, for a port and for the supply pins:
        take them from there, stay well below, and ask a qualified engineer. Nothing here is for the mains.
      </Caution>
    </Panel>
  );
}

/** Bits of the word that the code takes. */
const codeBitsOf = ({ bits, shift }: { readonly bits: number; readonly shift: number }) =>
  (2 ** bits - 1) * 2 ** shift;
