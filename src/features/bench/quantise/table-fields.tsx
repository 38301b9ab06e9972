import { limits } from '../../../../shared/contract/index.ts';
import { Explain } from '../../../components/index.ts';
import { Spot } from '../problems/field-problem.tsx';
import { useDefinition } from '../state/use-bench.ts';
import { DraftNumberField } from './draft-number-field.tsx';
import { FieldGroup } from './field-group.tsx';
import { useTableField } from './fields.ts';

export function TableFields() {
  const bits = useTableField('bits');
  const length = useTableField('length');
  const cycles = useTableField('cycles');
  return (
    <FieldGroup title="Table">
      <Spot path="table.bits">
        <DraftNumberField
          label="Bit depth"
          unit="bits"
          isInteger
          {...limits.bits}
          allowed={`a whole number from ${limits.bits.min} to ${limits.bits.max}`}
          description={<LevelsOfBits />}
          aside={
            <Explain title="Bit depth">
              <p>
                Bits of a code. b bits tell 2^b levels apart; each bit more halves the LSB and adds 6.02 dB of
                SNR.
              </p>
              <p>Up to 8 bits an entry takes one byte, above that two.</p>
            </Explain>
          }
          {...bits}
        />
      </Spot>
      <Spot path="table.length">
        <DraftNumberField
          label="Table length"
          unit="entries"
          isInteger
          {...limits.tableLength}
          allowed={`a whole number from ${limits.tableLength.min} to ${limits.tableLength.max}`}
          description={<LengthHint />}
          aside={
            <Explain title="Table length">
              <p>
                Entries in the table. A table of N entries with K cycles holds harmonics below N/(2K); what
                lies above does not fit and is left out.
              </p>
              <p>A phase accumulator needs a power of two. A loop plays any length.</p>
            </Explain>
          }
          {...length}
        />
      </Spot>
      <Spot path="table.cycles">
        <DraftNumberField
          label="Cycles in the table"
          isInteger
          {...limits.cycles}
          allowed={`a whole number from ${limits.cycles.min} to ${limits.cycles.max}, fewer than half the table length`}
          aside={
            <Explain title="Cycles in the table">
              <p>
                How many times the wave goes round in the table, K. With several cycles the tone is K·fs/N, so
                that it comes nearer to a frequency that one cycle would miss.
              </p>
            </Explain>
          }
          {...cycles}
        />
      </Spot>
    </FieldGroup>
  );
}

function LevelsOfBits() {
  const bits = useDefinition(({ table }) => table.bits);
  if (!Number.isInteger(bits) || bits < limits.bits.min || bits > limits.bits.max) return null;
  return `${(2 ** bits).toLocaleString('en')} levels`;
}

function LengthHint() {
  const { length, cycles } = useDefinition(({ table }) => table);
  if (!Number.isInteger(length) || !(length > 2 * cycles)) return null;
  const highest = Math.ceil(length / (2 * cycles)) - 1;
  const isPower = 2 ** Math.round(Math.log2(length)) === length;
  return `Holds ${highest.toLocaleString('en')} ${highest === 1 ? 'harmonic' : 'harmonics'}${isPower ? ' · a power of two' : ''}`;
}
