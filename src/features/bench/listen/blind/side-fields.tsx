import { useId } from 'react';
import { NumberField, SelectField, type SelectOption } from '../../../../components/index.ts';
import { FieldProblem } from '../../../../components/field-frame.tsx';
import { RevisionFields } from '../../../../forms/revision-fields.tsx';
import { useListening } from '../listening.tsx';
import { sayBits, usualBits, usualRateHz } from './plan-side.ts';
import type { SideChoice, SideKind } from './side-choice.ts';
import type { SideState } from './use-side.ts';

interface SideFieldsProps {
  name: 'A' | 'B';
  choice: SideChoice;
  onChange: (next: SideChoice) => void;
  state: SideState;
  /** Whose library revisions are picked from; none where nobody is signed in. */
  team: string | undefined;
}

/** What one of the two is. */
export function SideFields({ name, choice, onChange, state, team }: SideFieldsProps) {
  const { table, sound } = useListening();
  const { bits } = table.definition.table;
  const id = useId();
  const options: readonly SelectOption<SideKind>[] = [
    { value: 'ideal', label: 'Ideal curve' },
    { value: 'table', label: `Quantised table, ${sayBits(bits)}` },
    { value: 'fewer', label: 'Fewer bits', isDisabled: bits === 1 },
    { value: 'revision', label: 'Another revision', isDisabled: team === undefined },
    { value: 'rate', label: 'Another sample rate' },
  ];
  return (
    <div className="blind-side" role="group" aria-labelledby={id}>
      <p id={id} className="blind-name">
        {name}
      </p>
      <div className="blind-fields">
        <SelectField
          label={`What ${name} is`}
          hideLabel
          value={choice.kind}
          options={options}
          onChange={(kind) => onChange({ ...choice, kind })}
        />
        {choice.kind === 'fewer' && bits > 1 && (
          <NumberField
            label="Bits"
            unit="bits"
            isInteger
            min={1}
            max={bits - 1}
            allowed={`a whole number from 1 to ${bits - 1}, fewer than the table has`}
            value={choice.bits ?? usualBits(bits)}
            onChange={(next) => onChange({ ...choice, bits: next })}
          />
        )}
        {choice.kind === 'rate' && (
          <NumberField
            label="Sample rate"
            unit="Hz"
            min={0.001}
            allowed="a number of hertz, 0.001 or more"
            value={choice.sampleRateHz ?? usualRateHz(sound.drive)}
            onChange={(next) => onChange({ ...choice, sampleRateHz: next })}
          />
        )}
        {choice.kind === 'revision' && team !== undefined && (
          <RevisionFields
            team={team}
            picked={choice.picked}
            onPick={(picked) => onChange({ ...choice, picked })}
          />
        )}
        <div aria-live="polite">
          {state.kind === 'waiting' && <p className="field-description">Building the table…</p>}
          {state.kind === 'ready' && state.note !== null && <p className="field-description">{state.note}</p>}
          {state.kind === 'fault' && <FieldProblem id={`${id}-fault`}>{state.fault}</FieldProblem>}
        </div>
      </div>
    </div>
  );
}
