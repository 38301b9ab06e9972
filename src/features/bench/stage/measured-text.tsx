import { useId, useState } from 'react';
import { Button, TextField, icons } from '../../../components/index.ts';
import type { Comma, LevelsReading } from '../quantise/levels/read-levels.ts';

interface MeasuredTextProps {
  label: string;
  description: string;
  text: string;
  reading: LevelsReading;
  onChange: (text: string, comma: Comma | undefined) => void;
}

/** A file of 65,536 voltages takes less. */
const largestFile = 4_000_000;

/** Voltages typed, pasted or from a CSV file; a comma that can be read in two ways is asked about. */
export function MeasuredText({ label, description, text, reading, onChange }: MeasuredTextProps) {
  const fileId = useId();
  const [fault, setFault] = useState<string | null>(null);
  const takeFile = async (file: File | undefined) => {
    if (file === undefined) return;
    setFault(
      file.size > largestFile
        ? `${file.name} has ${file.size.toLocaleString('en')} bytes; allowed: at most 4 MB`
        : null,
    );
    if (file.size <= largestFile) onChange(await file.text(), undefined);
  };
  return (
    <div className="space-y-2">
      <TextField
        label={label}
        multiline
        isCode
        value={text}
        onChange={(next) => {
          setFault(null);
          onChange(next, undefined);
        }}
        description={description}
        problem={
          fault ??
          (reading.kind === 'faults' && (
            <ul>
              {reading.faults.map(({ line, value, allowed }, index) => (
                <li key={index}>
                  Line {line}: “{value}” is not allowed. Allowed: {allowed}.
                </li>
              ))}
            </ul>
          ))
        }
      />
      {reading.kind === 'ask' && (
        <div className="reasons" role="group" aria-label={`How ${reading.text} is meant`}>
          <p>“{reading.text}” can be read in two ways. In this text the comma is</p>
          <div className="flex flex-wrap gap-2">
            {reading.readings.map(({ comma, says }) => (
              <Button key={comma} size="small" onPress={() => onChange(text, comma)}>
                {says}
              </Button>
            ))}
          </div>
        </div>
      )}
      <label htmlFor={fileId} className="button button-plain button-small file-button">
        <icons.upload />
        {`Open a CSV file of ${label.toLowerCase()}`}
        <input
          id={fileId}
          type="file"
          className="sr-only"
          accept=".csv,.txt,text/csv,text/plain"
          onChange={({ target }) => {
            void takeFile(target.files?.[0]);
            target.value = '';
          }}
        />
      </label>
    </div>
  );
}
