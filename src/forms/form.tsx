import { useEffect, useRef, type ReactNode } from 'react';
import { sayTriesLeft } from '../api/rate-standing.ts';
import { Button, type ButtonProps } from '../components/index.ts';
import { ProblemNotice } from './problem-notice.tsx';
import type { Submitting } from './use-submit.ts';

export interface FormProps {
  /** Spoken name. */
  label: string;
  submitting: Pick<Submitting<never>, 'isBusy' | 'fault'>;
  onSubmit: () => void;
  /** Words on the button that sends it. */
  action: string;
  variant?: ButtonProps['variant'];
  /** Why it cannot be sent at all. */
  refusedBecause?: string | undefined;
  /** Paths of the fields in sight; problems elsewhere are listed. */
  fields: readonly string[];
  children: ReactNode;
  /** Beside the button. */
  aside?: ReactNode;
}

/** Fields over one button. After a refusal the first field at fault has the focus, and everything typed is still there. */
export function Form({
  label,
  submitting,
  onSubmit,
  action,
  variant = 'primary',
  refusedBecause,
  fields,
  children,
  aside,
}: FormProps) {
  const form = useRef<HTMLFormElement>(null);
  const { isBusy, fault } = submitting;
  const triesLeft = fault && sayTriesLeft(fault.rates);

  useEffect(() => {
    if (fault) form.current?.querySelector<HTMLElement>('[aria-invalid=true]')?.focus();
  }, [fault]);

  return (
    <form
      ref={form}
      className="form"
      aria-label={label}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        onSubmit();
      }}
    >
      {children}
      <ProblemNotice
        fault={fault}
        shownElsewhere={fields}
        actions={fault?.isPassing && 'Nothing you typed is lost; send it again.'}
      />
      <div className="form-actions">
        <Button
          type="submit"
          variant={variant}
          isDisabled={isBusy || refusedBecause !== undefined}
          disabledReason={refusedBecause ?? 'This is under way'}
        >
          {isBusy ? 'One moment…' : action}
        </Button>
        {aside}
      </div>
      {triesLeft && (
        <p className="quiet" role="status">
          {triesLeft}
        </p>
      )}
      {refusedBecause !== undefined && <p className="quiet">{refusedBecause}</p>}
    </form>
  );
}
