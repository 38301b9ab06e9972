import { parseQuantity } from '../../../../shared/quantities/index.ts';
import { NumberField, type NumberFieldProps } from '../../../components/index.ts';

/**
 * A number field that hands on what it refuses too, as long as it is a number: a draft holds what was typed, and the
 * definition's own rules say beside the field what is wrong with it. Arrow keys still stop at the ends.
 */
export function DraftNumberField(props: NumberFieldProps) {
  const { unit, min = -Infinity, max = Infinity, isInteger = false, onChange } = props;
  return (
    <NumberField
      {...props}
      onDraft={(text) => {
        const reading = parseQuantity(text, unit);
        if (reading.kind !== 'number') return;
        const { value } = reading;
        const isAllowed = value >= min && value <= max && (!isInteger || Number.isInteger(value));
        if (!isAllowed) onChange(value);
      }}
    />
  );
}
