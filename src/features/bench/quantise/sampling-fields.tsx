import type { TableSettings } from '../../../../shared/contract/index.ts';
import { ChoiceField, type SelectOption } from '../../../components/index.ts';
import { Spot } from '../problems/field-problem.tsx';
import { DraftNumberField } from './draft-number-field.tsx';
import { FieldGroup } from './field-group.tsx';
import { useTableField } from './fields.ts';

const samplings: readonly SelectOption<TableSettings['sampleAt']>[] = [
  {
    value: 'start',
    label: 'Step’s start',
    hint: 'Entry k is the wave at k/N: the first entry is the wave’s own start.',
  },
  {
    value: 'centre',
    label: 'Step’s centre',
    hint: 'Entry k is the wave at (k + ½)/N: a symmetrical wave gives a symmetrical table.',
  },
];

export function SamplingFields() {
  const sampleAt = useTableField('sampleAt');
  const startPhaseDeg = useTableField('startPhaseDeg');
  return (
    <FieldGroup title="Sampling">
      <Spot path="table.sampleAt">
        <ChoiceField label="Sampled at the" options={samplings} {...sampleAt} />
      </Spot>
      <Spot path="table.startPhaseDeg">
        <DraftNumberField
          label="Start phase"
          unit="°"
          min={0}
          max={359}
          allowed="a number of degrees from 0 up to, not including, 360"
          description="Where in the cycle the table begins."
          {...startPhaseDeg}
        />
      </Spot>
    </FieldGroup>
  );
}
