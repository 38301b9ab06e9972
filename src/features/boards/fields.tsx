import type { ReactNode } from 'react';
import { NumberField, SwitchField, type NumberFieldProps } from '../../components/index.ts';

interface Bounds {
  readonly min: number;
  readonly max: number;
}

interface BoundedFieldProps extends Pick<
  NumberFieldProps,
  'label' | 'value' | 'onChange' | 'unit' | 'description' | 'isInteger' | 'step'
> {
  bounds: Bounds;
  problem?: ReactNode;
}

const shown = (bound: number) =>
  Math.abs(bound) < 1e6 && (bound === 0 || Math.abs(bound) > 1e-4) ? String(bound) : bound.toExponential();

/** A number within the bounds of the contract, which its fault names. */
export function BoundedField({ bounds, unit = '', isInteger, ...props }: BoundedFieldProps) {
  const what = isInteger ? 'a whole number' : 'a number';
  return (
    <NumberField
      {...props}
      {...bounds}
      unit={unit}
      isInteger={isInteger ?? false}
      allowed={`${what} from ${shown(bounds.min)} to ${shown(bounds.max)}${unit && ` ${unit}`}`}
    />
  );
}

interface OptionalFieldProps extends Omit<BoundedFieldProps, 'value' | 'onChange'> {
  /** Words on the switch: `A load is connected`. */
  asks: string;
  value: number | undefined;
  onChange: (value: number | undefined) => void;
  /** What it begins with when it is switched on. */
  first: number;
}

/** A number that may be absent. */
export function OptionalField({ asks, value, onChange, first, ...props }: OptionalFieldProps) {
  return (
    <div className="board-group">
      <SwitchField
        label={asks}
        isOn={value !== undefined}
        onChange={(isOn) => onChange(isOn ? first : undefined)}
      />
      {value !== undefined && <BoundedField {...props} value={value} onChange={onChange} />}
    </div>
  );
}
