import type { Problem, TableSettings } from '../../../../shared/contract/index.ts';
import { Button, ChoiceField, Explain, SwitchField, type SelectOption } from '../../../components/index.ts';
import { nameOfField } from '../problems/field-names.ts';
import { Spot, sayHere } from '../problems/field-problem.tsx';
import { useCalmTable } from '../state/tables.ts';
import { changeDefinition, useDefinition } from '../state/use-bench.ts';
import { useTableField } from './fields.ts';
import { asFoldNeeds, reasonsAgainstFold } from './fold-needs.ts';

const codings: readonly SelectOption<TableSettings['coding']>[] = [
  {
    value: 'offset-binary',
    label: 'Offset binary',
    hint: 'Stored as 0…2^b − 1, as ladders and PWM take it.',
  },
  {
    value: 'twos-complement',
    label: 'Two’s complement',
    hint: 'Stored signed, −2^(b−1)…2^(b−1) − 1, as many serial converters and sums in firmware take it.',
  },
];

const folds: readonly SelectOption<TableSettings['fold']>[] = [
  { value: 'none', label: 'The whole table', hint: 'Every entry is stored; any wave can be.' },
  {
    value: 'quarter',
    label: 'The first quarter',
    hint: 'A quarter of the bytes. Firmware goes through it forwards, backwards and upside down.',
  },
];

/** How codes lie in memory. */
export function StorageFields() {
  const coding = useTableField('coding');
  const complement = useTableField('complement');
  return (
    <>
      <Spot path="table.coding">
        <ChoiceField
          label="Coding"
          options={codings}
          aside={
            <Explain title="Coding">
              <p>Offset binary stores code c as it is. Two’s complement stores c − 2^(b−1).</p>
              <p>The voltages are the same; take what the converter or your own arithmetic expects.</p>
            </Explain>
          }
          {...coding}
        />
      </Spot>
      <Spot path="table.complement">
        <SwitchField
          label="Invert every code"
          isOn={complement.value}
          onChange={complement.onChange}
          problem={complement.problem}
          description="For drivers that are active low: code c is stored as 2^b − 1 − c, before coding."
        />
      </Spot>
      <FoldField />
    </>
  );
}

function FoldField() {
  const fold = useTableField('fold');
  const definition = useDefinition((whole) => whole);
  const codes = useCalmTable()?.codes ?? null;
  const reasons = reasonsAgainstFold(definition, codes);
  const { table } = definition;
  return (
    <div className="space-y-2">
      <Spot path="table.fold">
        <ChoiceField
          label="Stored"
          options={folds}
          aside={
            <Explain title="Storing a quarter">
              <p>
                A sine’s other three quarters follow from its first: <code>c[N/2−1−k] = c[k]</code> and{' '}
                <code>c[N/2+k] = 2^b − 1 − c[k]</code>. The firmware works the index out, so it takes a few
                cycles more an entry.
              </p>
              <p>
                The wave must have that symmetry: a sum of odd harmonics, each in phase 0° or 180°, without
                offset. The table must keep it: sampled at the step’s centre, full span, rounded to the
                nearest code, one cycle, a length that 4 divides, no dither and no shaping.
              </p>
            </Explain>
          }
          {...fold}
        />
      </Spot>
      {reasons.length > 0 &&
        (fold.value === 'quarter' ? <Reasons {...{ reasons, table }} /> : <WhyNot {...{ reasons, table }} />)}
    </div>
  );
}

interface ReasonsProps {
  reasons: readonly Problem[];
  table: TableSettings;
}

/** Nobody has asked for a quarter yet: told on request. */
function WhyNot(props: ReasonsProps) {
  return (
    <details className="why-not">
      <summary>Why a quarter would be refused now</summary>
      <Reasons {...props} />
    </details>
  );
}

function Reasons({ reasons, table }: ReasonsProps) {
  const isByShape = reasons.some(({ path }) => path === 'table.fold');
  return (
    <div className="reasons">
      <ul>
        {reasons.map((problem) => (
          <li key={problem.path}>
            {nameOfField(problem.path)}: {sayHere(problem)}
          </li>
        ))}
      </ul>
      {isByShape && (
        <p>
          The codes do not mirror. Use odd harmonics in phase 0° or 180° only, without offset, and start phase
          0°
          {breaksMirror(table) && ', and neither dither nor shaping'}.
        </p>
      )}
      {(!isByShape || breaksMirror(table)) && (
        <Button size="small" onPress={() => changeDefinition(asFoldNeeds)}>
          Set what a quarter needs
        </Button>
      )}
    </div>
  );
}

function breaksMirror({ dither, shaping }: TableSettings): boolean {
  return dither !== 'none' || shaping !== 0;
}
