import { useId, type ReactNode } from 'react';
import { FieldProblem, describedBy, fieldIds } from './field-frame.tsx';
import { joinClasses } from './join-classes.ts';
import type { SelectOption } from './select-field.tsx';

export interface ChoiceFieldProps<Value extends string = string> {
  label: string;
  value: Value;
  /** Two to four short ones. */
  options: readonly SelectOption<Value>[];
  onChange: (value: Value) => void;
  description?: ReactNode;
  problem?: ReactNode;
  hideLabel?: boolean;
  aside?: ReactNode;
}

/** One of a few, all in sight: real radio buttons laid as one course of stones, so arrow keys walk them. */
export function ChoiceField<Value extends string>({
  label,
  value,
  options,
  onChange,
  description,
  problem,
  hideLabel,
  aside,
}: ChoiceFieldProps<Value>) {
  const id = useId();
  const ids = fieldIds(id);
  const help = options.find((option) => option.value === value)?.hint ?? description;
  return (
    <fieldset className="field" aria-describedby={describedBy(ids, help, problem)}>
      <legend className={joinClasses('field-head', hideLabel && 'sr-only')}>
        {label}
        {aside}
      </legend>
      <div className="choice-course">
        {options.map((option) => (
          <label key={option.value} className="choice-stone">
            <input
              type="radio"
              name={id}
              value={option.value}
              checked={option.value === value}
              disabled={option.isDisabled}
              onChange={() => {
                onChange(option.value);
              }}
            />
            <span>{option.label}</span>
          </label>
        ))}
      </div>
      {help && (
        <p id={ids.description} className="field-description">
          {help}
        </p>
      )}
      <div aria-live="polite">{problem && <FieldProblem id={ids.problem}>{problem}</FieldProblem>}</div>
    </fieldset>
  );
}
