import { type ComponentPropsWithRef, type ReactNode } from 'react';
import { joinClasses } from './join-classes.ts';
import type { Icon } from './icons.tsx';

type Aria = { [name in `aria-${string}`]?: string | boolean | number };

export interface ButtonProps extends Aria {
  variant?: 'primary' | 'plain' | 'quiet' | 'danger';
  size?: 'small' | 'medium';
  onPress?: () => void;
  isDisabled?: boolean;
  /** Why the button does nothing now. It stays focusable, so that the reason can be read. */
  disabledReason?: string;
  type?: 'button' | 'submit';
  icon?: Icon;
  children: ReactNode;
  ref?: ComponentPropsWithRef<'button'>['ref'];
}

/** A button with words on it. A refused press says why in its description and tooltip. */
export function Button({
  variant = 'plain',
  size = 'medium',
  onPress,
  isDisabled = false,
  disabledReason,
  type = 'button',
  icon: IconDrawing,
  children,
  ...rest
}: ButtonProps) {
  return (
    <button
      {...rest}
      type={type}
      className={joinClasses('button', `button-${variant}`, size === 'small' && 'button-small')}
      aria-disabled={isDisabled || undefined}
      aria-description={isDisabled ? disabledReason : undefined}
      title={isDisabled ? disabledReason : undefined}
      onClick={(event) => {
        if (isDisabled) event.preventDefault();
        else onPress?.();
      }}
    >
      {IconDrawing && <IconDrawing />}
      {children}
    </button>
  );
}

export interface IconButtonProps extends Aria {
  /** Spoken name, shown as a tooltip too. */
  label: string;
  icon: Icon;
  onPress?: () => void;
  /** Makes it a toggle: on or off. */
  isPressed?: boolean;
  isDisabled?: boolean;
  disabledReason?: string;
  size?: 'small' | 'medium';
  ref?: ComponentPropsWithRef<'button'>['ref'];
}

/** A button with a drawing on it; the label is its name. */
export function IconButton({
  label,
  icon: IconDrawing,
  onPress,
  isPressed,
  isDisabled = false,
  disabledReason,
  size = 'medium',
  ...rest
}: IconButtonProps) {
  return (
    <button
      {...rest}
      type="button"
      className={joinClasses('icon-button', size === 'small' && 'icon-button-small')}
      aria-label={label}
      aria-pressed={isPressed}
      aria-disabled={isDisabled || undefined}
      aria-description={isDisabled ? disabledReason : undefined}
      title={isDisabled && disabledReason ? `${label}: ${disabledReason}` : label}
      onClick={(event) => {
        if (isDisabled) event.preventDefault();
        else onPress?.();
      }}
    >
      <IconDrawing />
    </button>
  );
}
