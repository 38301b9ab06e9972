import { useId } from 'react';
import { offFromBottom, type BitMask } from '../../../../../shared/listening/index.ts';

interface BottomFieldProps {
  bits: number;
  off: BitMask;
  onChange: (count: number) => void;
}

/** Takes bits off from the least significant upwards, all but the last. */
export function BottomField({ bits, off, onChange }: BottomFieldProps) {
  const id = useId();
  // All off, by single presses, is one more than can be set here.
  const count = Math.min(offFromBottom(off), bits - 1);
  const words = count === 0 ? 'none' : count === 1 ? 'bit 0' : `bits 0 to ${count - 1}`;
  return (
    <div className="field">
      <div className="field-head">
        <label htmlFor={id}>Off from the bottom up</label>
      </div>
      <div className="bottom-bar">
        <input
          id={id}
          type="range"
          min={0}
          max={bits - 1}
          step={1}
          value={count}
          disabled={bits === 1}
          aria-valuetext={words}
          onChange={(event) => onChange(Number(event.target.value))}
        />
        <output htmlFor={id}>{words}</output>
      </div>
    </div>
  );
}
