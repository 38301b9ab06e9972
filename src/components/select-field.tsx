import { useId, type ReactNode } from 'react';
import { FieldFrame, describedBy, fieldIds } from './field-frame.tsx';
import { icons } from './icons.tsx';

export interface SelectOption<Value extends string = string> {
  value: Value;
  label: string;
  /** Said under the field while the option is chosen. */
  hint?: string;
  /** In sight but not to be chosen; the field's description says why. */
  isDisabled?: boolean;
}

export interface SelectFieldProps<Value extends string = string> {
  label: string;
  value: Value;
  options: readonly SelectOption<Value>[];
  onChange: (value: Value) => void;
  description?: ReactNode;
  problem?: ReactNode;
  hideLabel?: boolean;
  isDisabled?: boolean;
  aside?: ReactNode;
}

/** One of many, by the platform's own list. */
export function SelectField<Value extends string>({
  label,
  value,
  options,
  onChange,
  description,
  problem,
  hideLabel,
  isDisabled,
  aside,
}: SelectFieldProps<Value>) {
  const ids = fieldIds(useId());
  const help = options.find((option) => option.value === value)?.hint ?? description;
  return (
    <FieldFrame {...{ ids, label, hideLabel, problem, aside }} description={help}>
      <div className="select-box" data-invalid={problem ? '' : undefined}>
        <select
          id={ids.input}
          value={value}
          disabled={isDisabled}
          aria-invalid={problem ? true : undefined}
          aria-describedby={describedBy(ids, help, problem)}
          onChange={(event) => {
            onChange(event.target.value as Value);
          }}
        >
          {options.map((option) => (
            <option key={option.value} value={option.value} disabled={option.isDisabled}>
              {option.label}
            </option>
          ))}
        </select>
        <icons.chevron width="16" height="16" />
      </div>
    </FieldFrame>
  );
}
