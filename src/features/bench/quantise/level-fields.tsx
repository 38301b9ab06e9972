import { limits, type LevelSettings, type Transfer } from '../../../../shared/contract/index.ts';
import { Explain, SelectField, SwitchField, type SelectOption } from '../../../components/index.ts';
import { Spot, useFieldProblem } from '../problems/field-problem.tsx';
import { changeDefinition, useDefinition } from '../state/use-bench.ts';
import { DraftNumberField } from './draft-number-field.tsx';
import { FieldGroup } from './field-group.tsx';
import { useLevelField } from './fields.ts';

const normalisations: readonly SelectOption<LevelSettings['normalise']>[] = [
  { value: 'peak', label: 'To the peak', hint: 'The highest excursion reaches full scale; zero stays zero.' },
  {
    value: 'span',
    label: 'To the whole span',
    hint: 'The minimum takes the lowest code, the maximum the highest; zero may move.',
  },
  {
    value: 'none',
    label: 'Not at all',
    hint: 'Amplitudes count as they are: 1 is full scale, what is more is clipped.',
  },
];

type TransferKind = 'none' | 'cie-lightness' | 'gamma';

const transfers: readonly SelectOption<TransferKind>[] = [
  { value: 'none', label: 'None', hint: 'The signal goes to the codes as it is.' },
  {
    value: 'cie-lightness',
    label: 'CIE lightness',
    hint: 'The signal is a lightness L*/100; the codes become luminance, so that a lamp’s fade looks even (CIE 1976).',
  },
  { value: 'gamma', label: 'Gamma', hint: 'The signal to a power.' },
];

/** A level has a sign, a luminance has none. */
const transfersOfBipolar = transfers.map((transfer) =>
  transfer.value === 'none'
    ? {
        ...transfer,
        hint: 'The signal goes to the codes as it is. Curves are for unipolar waves, as lamps’ are.',
      }
    : transfer,
);

export function LevelFields() {
  const normalise = useLevelField('normalise');
  const level = useLevelField('level');
  const removeMean = useLevelField('removeMean');
  return (
    <FieldGroup title="Level">
      <Spot path="level.normalise">
        <SelectField label="Normalise" options={normalisations} {...normalise} />
      </Spot>
      <Spot path="level.level">
        <DraftNumberField
          label="Level"
          min={0}
          max={1}
          step={0.01}
          allowed="a number from 0 to 1"
          description={<LevelInDb />}
          aside={
            <Explain title="Level">
              <p>
                A fraction of full scale that the normalised wave is multiplied with. 1 uses every code; each
                halving costs 6.02 dB of SNR.
              </p>
            </Explain>
          }
          {...level}
        />
      </Spot>
      <Spot path="level.removeMean">
        <SwitchField
          label="Remove the mean"
          isOn={removeMean.value}
          onChange={removeMean.onChange}
          description="Takes the table’s mean away before normalising, so that a loudspeaker gets no DC from the wave itself."
        />
      </Spot>
      <TransferFields />
    </FieldGroup>
  );
}

function LevelInDb() {
  const level = useDefinition((definition) => definition.level.level);
  if (!(level > 0) || level > 1) return null;
  return `${(20 * Math.log10(level)).toFixed(1)} dB of full scale`;
}

/** A curve for lamps; bipolar waves are told that it is not for them, and what makes it so. */
function TransferFields() {
  const range = useDefinition(({ table }) => table.range);
  const { value, onChange, problem } = useLevelField('transfer');
  const gammaProblem = useFieldProblem('level.transfer.gamma');
  const kind = typeof value === 'string' ? value : 'gamma';
  return (
    <>
      <Spot path="level.transfer">
        <SelectField
          label="Transfer curve"
          options={range === 'unipolar' ? transfers : transfersOfBipolar}
          aside={
            <Explain title="Transfer curve">
              <p>
                The eye does not see light in proportion. A transfer curve bends the levelled signal x before
                it is quantised: <code>x^γ</code>, or lightness L* = 100x to luminance,{' '}
                <code>((L* + 16)/116)³</code> above 8, else <code>L*/903.3</code> (CIE 1976).
              </p>
              <p>
                It makes a lamp’s fade look even. Only unipolar waves take one, as a duty or a luminance has
                no sign. Dark ends want many bits: the curve is flat there.
              </p>
            </Explain>
          }
          value={kind}
          onChange={(next) => onChange(next === 'gamma' ? { gamma: 2.2 } : next)}
          problem={problem}
        />
      </Spot>
      {typeof value === 'object' && (
        <Spot path="level.transfer.gamma">
          <DraftNumberField
            label="Gamma"
            {...limits.gamma}
            step={0.1}
            allowed={`a number from ${limits.gamma.min} to ${limits.gamma.max}`}
            value={value.gamma}
            onChange={changeGamma}
            problem={gammaProblem}
          />
        </Spot>
      )}
    </>
  );
}

function changeGamma(gamma: number): void {
  const transfer: Transfer = { gamma };
  changeDefinition(
    (definition) => ({ ...definition, level: { ...definition.level, transfer } }),
    'level.transfer.gamma',
  );
}
