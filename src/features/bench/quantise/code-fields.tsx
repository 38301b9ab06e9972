import type { TableSettings } from '../../../../shared/contract/index.ts';
import {
  ChoiceField,
  Explain,
  SelectField,
  SwitchField,
  type SelectOption,
} from '../../../components/index.ts';
import { Spot } from '../problems/field-problem.tsx';
import { FieldGroup } from './field-group.tsx';
import { useTableField } from './fields.ts';

const ranges: readonly SelectOption<TableSettings['range']>[] = [
  { value: 'bipolar', label: 'Bipolar', hint: 'The signal swings −1…1, as sound does.' },
  {
    value: 'unipolar',
    label: 'Unipolar',
    hint: 'The signal lies in 0…1, as a lamp’s duty does; what is below is clipped.',
  },
];

const scales: readonly SelectOption<TableSettings['scale']>[] = [
  {
    value: 'full-span',
    label: 'Full span',
    hint: '−1 takes code 0 and +1 the top code; zero falls between two codes.',
  },
  {
    value: 'mid-tread',
    label: 'Mid-tread',
    hint: 'Zero has a code of its own, half of 2^b; +1 lies one LSB beyond the top code. Bipolar only.',
  },
];

const roundings: readonly SelectOption<TableSettings['rounding']>[] = [
  { value: 'half-up', label: 'Half up', hint: 'To the nearest code, a tie to the higher.' },
  {
    value: 'half-even',
    label: 'Half to even',
    hint: 'To the nearest code, a tie to the even one: ties leave no mean error.',
  },
  { value: 'down', label: 'Down', hint: 'To the code below, as a shift does: a mean error of half an LSB.' },
];

const codings: readonly SelectOption<TableSettings['coding']>[] = [
  {
    value: 'offset-binary',
    label: 'Offset binary',
    hint: 'Stored as 0…2^b − 1, as ladders and PWM take it.',
  },
  { value: 'twos-complement', label: 'Two’s complement', hint: 'Stored signed, −2^(b−1)…2^(b−1) − 1.' },
];

export function CodeFields() {
  const range = useTableField('range');
  const scale = useTableField('scale');
  const rounding = useTableField('rounding');
  const coding = useTableField('coding');
  const complement = useTableField('complement');
  return (
    <FieldGroup title="Codes">
      <Spot path="table.range">
        <ChoiceField label="Range" options={ranges} {...range} />
      </Spot>
      <Spot path="table.scale">
        <ChoiceField
          label="Scale"
          options={scales}
          aside={
            <Explain title="Scale">
              <p>Full span: v = (x + 1)/2 · (2^b − 1), one LSB is 2/(2^b − 1).</p>
              <p>Mid-tread: v = x · 2^b/2 + 2^b/2, one LSB is 2/2^b. It needs a bipolar range.</p>
            </Explain>
          }
          {...scale}
        />
      </Spot>
      <Spot path="table.rounding">
        <SelectField label="Rounding" options={roundings} {...rounding} />
      </Spot>
      <Spot path="table.coding">
        <SelectField label="Coding" options={codings} {...coding} />
      </Spot>
      <Spot path="table.complement">
        <SwitchField
          label="Invert every code"
          isOn={complement.value}
          onChange={complement.onChange}
          description="For drivers that are active low: code c is stored as 2^b − 1 − c."
        />
      </Spot>
    </FieldGroup>
  );
}
