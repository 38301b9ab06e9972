import { useId, useRef, useState } from 'react';
import { parseQuantity, quantityText } from '../../../../shared/quantities/index.ts';

export interface BarEntryProps {
  harmonic: number;
  /** What was typed to open it; a number where it opens on the bar's present height. */
  start: string | number;
  /** Middle of the bar, from the field's left edge, in CSS pixels. */
  at: number;
  onDone: (amplitude: number) => void;
  onCancel: () => void;
}

/** A small field over a bar for typing its exact amplitude. It stays until what is typed is a number, or is dropped. */
export function BarEntry({ harmonic, start, at, onDone, onCancel }: BarEntryProps) {
  const id = useId();
  const [text, setText] = useState(typeof start === 'string' ? start : quantityText(start));
  const [problem, setProblem] = useState<string | null>(null);

  // Letting go of the field moves the focus, which would finish it a second time.
  const isOver = useRef(false);
  const close = (how: () => void) => {
    if (isOver.current) return;
    isOver.current = true;
    how();
  };

  const finish = () => {
    const reading = parseQuantity(text);
    if (reading.kind === 'number') close(() => onDone(reading.value));
    else if (reading.kind === 'empty') close(onCancel);
    else if (reading.kind === 'ask')
      setProblem(`${text} can be read as ${reading.readings.map((one) => one.text).join(' or ')}.`);
    else setProblem(`“${text}” is not allowed; allowed: a finite number, or dB as in −6 dB.`);
  };

  return (
    <div className="bar-entry" style={{ left: at }}>
      <label htmlFor={id}>Harmonic {harmonic}</label>
      <input
        autoFocus
        onFocus={(event) => {
          if (typeof start === 'number') event.target.select();
        }}
        id={id}
        type="text"
        autoComplete="off"
        value={text}
        aria-invalid={problem !== null || undefined}
        aria-describedby={problem === null ? undefined : `${id}-problem`}
        onChange={(event) => {
          setText(event.target.value);
          setProblem(null);
        }}
        onKeyDown={(event) => {
          event.stopPropagation();
          if (event.key === 'Enter') finish();
          if (event.key === 'Escape') close(onCancel);
        }}
        onBlur={finish}
      />
      <div aria-live="polite">
        {problem !== null && (
          <p id={`${id}-problem`} className="bar-entry-problem">
            {problem}
          </p>
        )}
      </div>
    </div>
  );
}
