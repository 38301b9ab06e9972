import type { BitMask } from '../../../../../shared/listening/index.ts';

interface BitRowProps {
  bits: number;
  off: BitMask;
  onChange: (off: BitMask) => void;
}

/** The table's bits as they stand in a code, most significant first: pressed in is on. */
export function BitRow({ bits, off, onChange }: BitRowProps) {
  return (
    <div className="bit-row" role="group" aria-label="Bits, most significant first">
      {Array.from({ length: bits }, (_, i) => bits - 1 - i).map((bit) => {
        const isOn = (off >> bit) % 2 === 0;
        return (
          <button
            key={bit}
            type="button"
            className="bit"
            aria-pressed={isOn}
            aria-label={`Bit ${bit}${sayEnd(bit, bits)}`}
            title={`Bit ${bit}, worth ${2 ** bit}: ${isOn ? 'on' : 'off'}`}
            onClick={() => onChange(off ^ (2 ** bit))}
          >
            <span className="bit-number">{bit}</span>
            <span className="bit-state">{isOn ? 'on' : 'off'}</span>
          </button>
        );
      })}
    </div>
  );
}

function sayEnd(bit: number, bits: number): string {
  if (bits === 1) return '';
  if (bit === bits - 1) return ', most significant';
  return bit === 0 ? ', least significant' : '';
}
