import type { ReactNode } from 'react';
import { z } from 'zod';
import { optionApplies, optionGroups, type Target } from '../../../shared/firmware/index.ts';
import { OptionField, type OptionOrigin } from './option-field.tsx';

interface OptionGroupsProps {
  target: Target;
  /** Options as typed; what is not there takes its default. */
  typed: Readonly<Record<string, unknown>>;
  /** What is taken where nothing is given, where the schema does not say so. */
  fallbacks: Readonly<Record<string, string | undefined>>;
  problemOf: (option: string) => ReactNode;
  /** Where an option's value comes from, if that is worth a word. */
  originOf?: (option: string) => OptionOrigin | undefined;
  onChange: (option: string, value: string) => void;
}

/** Groups that few exports need: behind one line, unless something in them is at fault. */
const behind = new Set(['Numbers and lines', 'Storage']);

/** The options that a target has, in groups; those that mean nothing as others are set are left out. */
export function OptionGroups({ target, typed, fallbacks, problemOf, originOf, onChange }: OptionGroupsProps) {
  const { shape } = target.options;
  const valueOf = (name: string) => String(typed[name] || standardOf(shape[name]));
  return (
    <>
      {optionGroups.map(({ title, options }) => {
        const shown = options.filter((name) => name in shape && optionApplies(name, valueOf));
        if (shown.length === 0) return null;
        const fields = shown.map((name) => (
          <OptionField
            key={`${target.id} ${name}`}
            name={name}
            schema={shape[name]}
            value={typed[name]}
            fallback={fallbacks[name]}
            problem={problemOf(name)}
            origin={originOf?.(name)}
            onChange={(value) => onChange(name, value)}
          />
        ));
        const set = shown.filter((name) => typed[name] !== undefined && typed[name] !== '').length;
        return behind.has(title) ? (
          <details key={title} className="option-group" open={shown.some(problemOf) || undefined}>
            <summary>
              {title}
              {set > 0 && <span className="quiet"> · {set} set</span>}
            </summary>
            <div className="field-pair">{fields}</div>
          </details>
        ) : (
          <fieldset key={title} className="option-group">
            <legend>{title}</legend>
            <div className="field-pair">{fields}</div>
          </fieldset>
        );
      })}
    </>
  );
}

function standardOf(schema: z.core.$ZodType | undefined): string {
  if (schema instanceof z.ZodDefault) return String(schema.def.defaultValue);
  return '';
}
