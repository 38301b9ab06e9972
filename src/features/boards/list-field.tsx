import { useId, useState, type ReactNode } from 'react';
import { quantityText } from '../../../shared/quantities/index.ts';
import { readList } from '../../boards/index.ts';
import { TextField } from '../../components/index.ts';
import { useUnread } from '../../components/unread-fields.ts';
import { sameNumbers } from './same-numbers.ts';

interface ListFieldProps {
  label: string;
  unit: string;
  value: readonly number[] | undefined;
  /** Nothing typed is nothing given. */
  onChange: (value: number[] | undefined) => void;
  description: string;
  problem?: ReactNode;
}

/** Numbers parted by blanks, semicolons or line ends, each as people write it. A wrong text stays as it was typed. */
export function ListField({ label, unit, value, onChange, description, problem }: ListFieldProps) {
  const id = useId();
  const [text, setText] = useState(() => sayList(value, unit));
  const read = readList(text, unit);
  // A value from elsewhere shows as itself.
  const [known, setKnown] = useState(value);
  if (known !== value) {
    setKnown(value);
    if (!('fault' in read) && !sameNumbers(read.numbers, value)) setText(sayList(value, unit));
  }
  const fault = 'fault' in read ? read.fault : undefined;
  useUnread(id, label, fault);
  return (
    <TextField
      label={label}
      isCode
      autoComplete="off"
      value={text}
      description={description}
      problem={fault ?? problem}
      onChange={(next) => {
        setText(next);
        const meant = readList(next, unit);
        if (!('fault' in meant)) onChange(meant.numbers);
      }}
    />
  );
}

const sayList = (value: readonly number[] | undefined, unit: string) =>
  (value ?? []).map((one) => quantityText(one, unit)).join(' ');
