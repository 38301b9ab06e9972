import { useId, useRef, useState, type KeyboardEvent, type ReactNode } from 'react';
import { parseQuantity, quantityText, type QuantityReading } from '../../shared/quantities/index.ts';
import { FieldFrame, describedBy, fieldIds } from './field-frame.tsx';
import { joinClasses } from './join-classes.ts';
import { useFittedText } from './number-text.ts';
import { useUnread } from './unread-fields.ts';

export interface NumberFieldProps {
  label: string;
  /** The last number that was allowed, in the field's unit. */
  value: number;
  /** Called for every allowed number that is typed, stepped to or pasted. */
  onChange: (value: number) => void;
  /** Unit of the value: `Hz`, `dB`, `%`, `°`, `V`, `Ω`, `s`, `bits`, `entries` …; none for a bare number or ratio. */
  unit?: string;
  min?: number;
  max?: number;
  /** What one arrow key adds. Shift and PageUp/PageDown add ten of it. */
  step?: number;
  /** What may stand here, in words: `a whole number from 1 to 16`. */
  allowed: string;
  isInteger?: boolean;
  /** A fault found outside the field, e.g. by a rule over two fields. */
  problem?: ReactNode;
  hideLabel?: boolean;
  description?: ReactNode;
  /** Each text as it is typed, allowed or not. */
  onDraft?: (text: string) => void;
  isDisabled?: boolean;
  aside?: ReactNode;
}

type Limits = Pick<NumberFieldProps, 'min' | 'max' | 'isInteger'>;

interface Draft {
  text: string;
  /** The field's value when the text was written. */
  writtenOver: number;
  /** The number the text stands for; the old value where it stands for none. */
  meant: number;
}

/**
 * A number as people write it. A wrong text stays as it was typed, with what is allowed beside it, and the value
 * keeps its last allowed number: nothing is clamped and nothing is lost.
 */
export function NumberField({
  label,
  value,
  onChange,
  unit = '',
  step = 1,
  allowed,
  hideLabel,
  ...props
}: NumberFieldProps) {
  const ids = fieldIds(useId());
  const [draft, setDraft] = useState<Draft | null>(null);
  const [hasFocus, setHasFocus] = useState(false);
  // A value from elsewhere (undo, a preset) shows as itself; a text still on its way, or refused by the owner, stays.
  const isCurrent = draft !== null && (Object.is(value, draft.meant) || Object.is(value, draft.writtenOver));
  // A text that has been left behind must not come back with its old value, by undo for instance.
  if (draft !== null && !isCurrent) setDraft(null);
  if (draft !== null && Object.is(value, draft.meant) && !Object.is(draft.writtenOver, value)) {
    setDraft({ ...draft, writtenOver: value });
  }
  const text = isCurrent ? draft.text : quantityText(value, unit);
  const reading = parseQuantity(text, unit);
  const fault = isCurrent ? faultOf(reading, text, allowed, props) : undefined;
  // An owner that takes refused numbers has this one, and tells of it itself.
  const isTakenUp = reading.kind === 'number' && Object.is(reading.value, value);
  useUnread(ids.input, label, hasFocus || isTakenUp ? undefined : fault);
  const input = useRef<HTMLInputElement>(null);
  const shown = useFittedText(input, text, hasFocus || isCurrent);

  const write = (next: string) => {
    props.onDraft?.(next);
    const meant = parseQuantity(next, unit);
    const isTaken = meant.kind === 'number' && isAllowed(meant.value, props);
    setDraft({ text: next, writtenOver: value, meant: isTaken ? meant.value : value });
    if (isTaken && !Object.is(meant.value, value)) onChange(meant.value);
  };

  const stepBy = (steps: number) => {
    const from = reading.kind === 'number' ? reading.value : value;
    const next = addSteps(from, steps, step);
    // At the end of the range a step lands on the end; past it there is nothing to step to.
    const { min = -Infinity, max = Infinity } = props;
    const goal = steps > 0 ? Math.min(next, Math.max(from, max)) : Math.max(next, Math.min(from, min));
    if (goal !== from) write(quantityText(goal, unit));
  };

  const onKeyDown = (event: KeyboardEvent) => {
    const size = event.shiftKey ? 10 : 1;
    const steps = { ArrowUp: size, ArrowDown: -size, PageUp: 10, PageDown: -10 }[event.key];
    if (steps === undefined || event.altKey || event.ctrlKey || event.metaKey) return;
    event.preventDefault();
    stepBy(steps);
  };

  const problem = fault ?? props.problem;
  return (
    <FieldFrame
      {...{ ids, label, hideLabel }}
      description={props.description}
      aside={props.aside}
      problem={
        problem && (
          <>
            {problem}
            {isCurrent && reading.kind === 'ask' && <Readings readings={reading.readings} onPick={write} />}
          </>
        )
      }
    >
      <div className="number-box" data-invalid={problem ? '' : undefined}>
        <input
          ref={input}
          id={ids.input}
          type="text"
          inputMode={unit === '' || props.isInteger ? 'decimal' : 'text'}
          autoComplete="off"
          spellCheck={false}
          disabled={props.isDisabled}
          value={shown}
          title={shown === text ? undefined : text}
          aria-invalid={problem ? true : undefined}
          aria-describedby={
            joinClasses(unit !== '' && `${ids.input}-unit`, describedBy(ids, props.description, problem)) ||
            undefined
          }
          aria-roledescription="number field"
          onChange={(event) => {
            write(event.target.value);
          }}
          onKeyDown={onKeyDown}
          onFocus={() => {
            setHasFocus(true);
          }}
          onBlur={() => {
            setHasFocus(false);
            if (fault === undefined && Object.is(draft?.meant, value)) setDraft(null);
          }}
        />
        {unit !== '' && (
          <span id={`${ids.input}-unit`} className="number-unit">
            {unit}
          </span>
        )}
      </div>
    </FieldFrame>
  );
}

function Readings({
  readings,
  onPick,
}: {
  readings: readonly { text: string }[];
  onPick: (text: string) => void;
}) {
  return (
    <span className="field-readings">
      {readings.map(({ text }) => (
        <button
          key={text}
          type="button"
          className="button button-plain button-small"
          onClick={() => {
            onPick(text);
          }}
        >
          {text}
        </button>
      ))}
    </span>
  );
}

function isAllowed(value: number, { min = -Infinity, max = Infinity, isInteger = false }: Limits): boolean {
  return value >= min && value <= max && (!isInteger || Number.isInteger(value));
}

function faultOf(
  reading: QuantityReading,
  text: string,
  allowed: string,
  limits: Limits,
): string | undefined {
  switch (reading.kind) {
    case 'number':
      return isAllowed(reading.value, limits)
        ? undefined
        : `${text.trim()} is not allowed; allowed: ${allowed}`;
    case 'ask':
      return `${text.trim()} can be read in two ways. Which is meant?`;
    case 'empty':
      return `Nothing is not allowed; allowed: ${allowed}`;
    case 'unreadable':
      return `“${text.trim()}” is not allowed: ${reading.why}; allowed: ${allowed}`;
  }
}

/** Adds whole steps on the step's own decimal grid, so that 0.1 + 0.2 shows as 0.3. */
function addSteps(from: number, steps: number, step: number): number {
  const decimals = (number: number) => /\.(\d+)$/.exec(String(number))?.[1].length ?? 0;
  const digits = Math.min(15, Math.max(decimals(from), decimals(step)));
  return Number((from + steps * step).toFixed(digits));
}
