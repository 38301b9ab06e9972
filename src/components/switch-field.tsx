import { useId, type ReactNode } from 'react';
import { FieldProblem, describedBy, fieldIds } from './field-frame.tsx';

export interface SwitchFieldProps {
  label: string;
  isOn: boolean;
  onChange: (isOn: boolean) => void;
  description?: ReactNode;
  problem?: ReactNode;
  isDisabled?: boolean;
  aside?: ReactNode;
}

/** On or off, in effect at once. */
export function SwitchField({
  label,
  isOn,
  onChange,
  description,
  problem,
  isDisabled,
  aside,
}: SwitchFieldProps) {
  const ids = fieldIds(useId());
  return (
    <div className="field">
      <div className="switch-row">
        <label className="switch">
          <input
            id={ids.input}
            type="checkbox"
            role="switch"
            checked={isOn}
            disabled={isDisabled}
            aria-invalid={problem ? true : undefined}
            aria-describedby={describedBy(ids, description, problem)}
            onChange={(event) => {
              onChange(event.target.checked);
            }}
          />
          <span className="switch-track" aria-hidden="true" />
          <span>{label}</span>
        </label>
        {aside}
      </div>
      {description && (
        <p id={ids.description} className="field-description">
          {description}
        </p>
      )}
      <div aria-live="polite">{problem && <FieldProblem id={ids.problem}>{problem}</FieldProblem>}</div>
    </div>
  );
}
