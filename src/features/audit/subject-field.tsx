import { useState } from 'react';
import { auditFiltersSchema } from '../../../shared/contract/index.ts';
import { TextField } from '../../components/index.ts';

interface SubjectFieldProps {
  subject: string;
  onChange: (subject: string) => void;
}

/** What was typed counts when it is left or with Enter: a half-typed subject is none. */
export function SubjectField({ subject, onChange }: SubjectFieldProps) {
  const [typed, setTyped] = useState(subject);
  const wanted = typed.trim();
  const fault = wanted === '' ? undefined : auditFiltersSchema.shape.subject.safeParse(wanted).error;
  const finish = () => {
    if (wanted !== subject && fault === undefined) onChange(wanted);
  };
  return (
    <form
      onBlur={finish}
      onSubmit={(event) => {
        event.preventDefault();
        finish();
      }}
    >
      <TextField
        label="To what"
        placeholder="table:fog-signal"
        isCode
        autoComplete="off"
        value={typed}
        onChange={setTyped}
        problem={fault && `This is not allowed. Allowed: ${fault.issues[0].message}.`}
      />
    </form>
  );
}
