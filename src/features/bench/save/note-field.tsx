import type { ReactNode } from 'react';
import { TextField } from '../../../components/index.ts';

/** As many characters as a note may have. */
const most = 2_000;
const nearlyFull = 1_500;

interface NoteFieldProps {
  value: string;
  onChange: (note: string) => void;
  problem: ReactNode;
}

export function NoteField({ value, onChange, problem }: NoteFieldProps) {
  return (
    <TextField
      label="Note"
      multiline
      description={
        value.length < nearlyFull
          ? 'What this revision is about. It may stay empty.'
          : `${value.length.toLocaleString('en')} of ${most.toLocaleString('en')} characters.`
      }
      value={value}
      onChange={onChange}
      problem={problem}
    />
  );
}
