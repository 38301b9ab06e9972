import type { TableSettings } from '../../../../shared/contract/index.ts';
import { ChoiceField, Explain, type SelectOption } from '../../../components/index.ts';
import { Spot } from '../problems/field-problem.tsx';
import { DraftNumberField } from './draft-number-field.tsx';
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

/** Where in the cycle the entries are taken. */
export function SamplingFields() {
  const sampleAt = useTableField('sampleAt');
  const startPhaseDeg = useTableField('startPhaseDeg');
  return (
    <>
      <Spot path="table.sampleAt">
        <ChoiceField
          label="Sampled at the"
          options={samplings}
          aside={
            <Explain title="Where an entry is taken">
              <p>
                <code>t = ((k + δ)·K/N + φ/360) mod 1</code> with δ = 0 at the step’s start and ½ at its
                centre, K cycles in N entries, φ the start phase.
              </p>
              <p>
                The centre spares a sine the two entries of exactly 0 and lets a quarter of it stand for the
                whole.
              </p>
            </Explain>
          }
          {...sampleAt}
        />
      </Spot>
      <Spot path="table.startPhaseDeg">
        <DraftNumberField
          label="Start phase"
          unit="°"
          min={0}
          max={359}
          allowed="a number of degrees from 0 up to, not including, 360"
          description="Where in the cycle the table begins: 90° turns a sine into a cosine."
          {...startPhaseDeg}
        />
      </Spot>
    </>
  );
}
