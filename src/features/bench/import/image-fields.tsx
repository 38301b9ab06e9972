import { useState } from 'react';
import { type CodeArray, type HexWords } from '../../../../shared/imports/index.ts';
import { ChoiceField, NumberField, SwitchField } from '../../../components/index.ts';
import type { ImagePart } from '../../../workers/imports-messages.ts';

interface ImageFieldsProps {
  /** A stretch of the image, byte by byte, named by its address. */
  segment: CodeArray;
  onChange: (part: ImagePart) => void;
}

/** Which part of an image is the table, and how its bytes make words: the file does not say. */
export function ImageFields({ segment, onChange }: ImageFieldsProps) {
  const first = Number(segment.name);
  const count = segment.values.length;
  const [part, setPart] = useState<ImagePart>({
    words: { wordBits: 8, byteOrder: 'low-first', isSigned: false },
    address: first,
    bytes: count,
  });
  const change = (next: ImagePart) => {
    setPart(next);
    onChange(next);
  };
  const changeWords = (words: Partial<HexWords>) => change({ ...part, words: { ...part.words, ...words } });
  const last = first + count - 1;
  return (
    <div className="field-pair">
      <NumberField
        label="First address"
        isInteger
        min={first}
        max={last}
        allowed={`a whole number from ${first} to ${last}`}
        value={part.address}
        onChange={(address) => change({ ...part, address, bytes: Math.min(part.bytes, last - address + 1) })}
      />
      <NumberField
        label="Bytes"
        isInteger
        min={2}
        max={last - part.address + 1}
        allowed={`a whole number from 2 to ${last - part.address + 1}`}
        value={part.bytes}
        onChange={(bytes) => change({ ...part, bytes })}
      />
      <ChoiceField
        label="Words of"
        value={part.words.wordBits === 8 ? 'one' : part.words.byteOrder}
        options={[
          { value: 'one', label: '1 byte' },
          { value: 'low-first', label: '2 bytes, low first' },
          { value: 'high-first', label: '2 bytes, high first' },
        ]}
        onChange={(kind) => changeWords(kind === 'one' ? { wordBits: 8 } : { wordBits: 16, byteOrder: kind })}
      />
      <SwitchField
        label="Words have a sign"
        isOn={part.words.isSigned}
        onChange={(isSigned) => changeWords({ isSigned })}
      />
    </div>
  );
}
