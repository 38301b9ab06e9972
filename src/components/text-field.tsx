import { useId, type ReactNode } from 'react';
import { FieldFrame, describedBy, fieldIds } from './field-frame.tsx';

export interface TextFieldProps {
  label: string;
  value: string;
  onChange: (value: string) => void;
  /** What may stand here, in words; shown beside the problem. */
  allowed?: string;
  problem?: ReactNode;
  description?: ReactNode;
  multiline?: boolean;
  hideLabel?: boolean;
  /** Code and identifiers: the mono face, no spelling marks. */
  isCode?: boolean;
  isReadOnly?: boolean;
  type?: 'text' | 'email' | 'password' | 'search' | 'url' | 'date';
  autoComplete?: string;
  placeholder?: string;
  aside?: ReactNode;
}

/** A line or a block of text. What was typed stays, right or wrong. */
export function TextField({
  label,
  value,
  onChange,
  allowed,
  problem,
  description,
  multiline = false,
  hideLabel,
  isCode = false,
  isReadOnly,
  type = 'text',
  autoComplete,
  placeholder,
  aside,
}: TextFieldProps) {
  const ids = fieldIds(useId());
  const shared = {
    id: ids.input,
    value,
    placeholder,
    autoComplete,
    readOnly: isReadOnly,
    spellCheck: !isCode,
    className: isCode ? 'text-box font-mono' : 'text-box',
    'aria-invalid': problem ? true : undefined,
    'aria-describedby': describedBy(ids, description, problem),
  };
  const said =
    problem && allowed ? (
      <>
        {problem} Allowed: {allowed}.
      </>
    ) : (
      problem
    );
  return (
    <FieldFrame {...{ ids, label, hideLabel, description, aside }} problem={said}>
      {multiline ? (
        <textarea
          {...shared}
          rows={4}
          onChange={(event) => {
            onChange(event.target.value);
          }}
        />
      ) : (
        <input
          {...shared}
          type={type}
          onChange={(event) => {
            onChange(event.target.value);
          }}
        />
      )}
    </FieldFrame>
  );
}
