import type { ReactNode } from 'react';
import { z } from 'zod';
import { SelectField } from '../select-field.tsx';
import { TextField } from '../text-field.tsx';
import { optionLabels, valueLabel } from './option-words.ts';

/** Where an option's value comes from, in words, and what can be done about it. */
export interface OptionOrigin {
  readonly says: string;
  readonly action?: ReactNode;
}

interface OptionFieldProps {
  name: string;
  schema: z.core.$ZodType;
  value: unknown;
  onChange: (value: string) => void;
  /** What is taken where nothing is given. */
  fallback?: string;
  problem: ReactNode;
  origin?: OptionOrigin;
}

/** A control for one option of a target, made from the option's own schema. */
export function OptionField({ name, schema, value, onChange, fallback, problem, origin }: OptionFieldProps) {
  const { inner, standard } = unwrap(schema);
  const label = optionLabels[name] ?? name;
  const meaning = sentence(schema instanceof z.ZodType ? schema.description : undefined);
  const description = origin ? (
    <>
      <strong className="option-origin">{origin.says}</strong> {meaning}
    </>
  ) : (
    meaning
  );
  const aside = origin?.action;
  const typed = typeof value === 'string' ? value : '';
  if (inner instanceof z.ZodEnum) {
    const values = inner.options.map(String);
    const choices = values.map((one) => ({ value: one, label: valueLabel(name, one) }));
    return (
      <SelectField
        label={label}
        value={typed || (standard ?? '')}
        options={standard === undefined ? [{ value: '', label: 'Not given' }, ...choices] : choices}
        onChange={onChange}
        {...{ description, problem, aside }}
      />
    );
  }
  return (
    <TextField
      label={label}
      value={typed}
      placeholder={fallback ?? standard}
      onChange={onChange}
      {...{ description, problem, aside }}
      isCode
      autoComplete="off"
    />
  );
}

/** The schema within `optional` and `default`, and the default. */
function unwrap(schema: z.core.$ZodType): { inner: z.core.$ZodType; standard?: string } {
  if (schema instanceof z.ZodDefault)
    return { ...unwrap(schema.unwrap()), standard: String(schema.def.defaultValue) };
  if (schema instanceof z.ZodOptional) return unwrap(schema.unwrap());
  return { inner: schema };
}

function sentence(words: string | undefined): string | undefined {
  return words && `${words[0].toUpperCase()}${words.slice(1)}.`;
}
