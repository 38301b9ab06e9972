import { useId, useState, type ReactNode } from 'react';
import { TextField } from '../../components/index.ts';
import { useUnread } from '../../components/unread-fields.ts';

interface HexFieldProps {
  label: string;
  value: number;
  onChange: (value: number) => void;
  problem?: ReactNode;
}

const read = (text: string): number | undefined => {
  const digits = /^0x([0-9a-f]{1,8})$/i.exec(text.trim())?.[1];
  if (digits !== undefined) return parseInt(digits, 16);
  const number = /^\d{1,10}$/.test(text.trim()) ? Number(text) : undefined;
  return number !== undefined && number < 2 ** 32 ? number : undefined;
};

/** Bits of a word, as `0x3000` or in decimal. A wrong text stays as it was typed. */
export function HexField({ label, value, onChange, problem }: HexFieldProps) {
  const id = useId();
  const [text, setText] = useState(`0x${value.toString(16)}`);
  const meant = read(text);
  const fault =
    meant === undefined
      ? `“${text}” is not allowed; allowed: 0x0 to 0xffffffff, or a whole number`
      : undefined;
  useUnread(id, label, fault);
  return (
    <TextField
      label={label}
      isCode
      autoComplete="off"
      value={meant !== undefined && meant !== value ? `0x${value.toString(16)}` : text}
      problem={fault ?? problem}
      onChange={(next) => {
        setText(next);
        const number = read(next);
        if (number !== undefined) onChange(number);
      }}
    />
  );
}
