import { useState } from 'react';
import { TextField, type TextFieldProps } from './text-field.tsx';

export interface PasswordFieldProps extends Pick<
  TextFieldProps,
  'label' | 'value' | 'onChange' | 'problem' | 'description'
> {
  /** Tells a password keeper which password it is. */
  autoComplete: 'current-password' | 'new-password';
}

/** A password, hidden until it is asked to be shown. Pasting is as good as typing. */
export function PasswordField(props: PasswordFieldProps) {
  const [isShown, setIsShown] = useState(false);
  return (
    <TextField
      {...props}
      isCode
      type={isShown ? 'text' : 'password'}
      aside={
        <button
          type="button"
          className="link field-aside"
          aria-pressed={isShown}
          aria-label={`Show ${props.label.toLowerCase()}`}
          onClick={() => {
            setIsShown(!isShown);
          }}
        >
          {isShown ? 'Hide' : 'Show'}
        </button>
      }
    />
  );
}
