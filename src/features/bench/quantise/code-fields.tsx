import type { TableSettings } from '../../../../shared/contract/index.ts';
import { ChoiceField, Explain, SelectField, type SelectOption } from '../../../components/index.ts';
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

/** Which signals there are codes for, and how a signal between two codes comes to one of them. */
export function CodeFields() {
  const range = useTableField('range');
  const scale = useTableField('scale');
  const rounding = useTableField('rounding');
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
        <SelectField
          label="Rounding"
          options={roundings}
          aside={
            <Explain title="Rounding">
              <p>
                How a position v between two codes becomes one of them: half up is ⌊v + ½⌋, down is ⌊v⌋. Half
                to even differs only where v lies exactly between two codes.
              </p>
              <p>
                Take half up unless the table must match what other firmware computes. Half to even keeps a
                symmetrical wave free of DC; down copies a right shift.
              </p>
            </Explain>
          }
          {...rounding}
        />
      </Spot>
    </FieldGroup>
  );
}
