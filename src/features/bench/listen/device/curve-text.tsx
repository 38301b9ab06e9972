import { useId, useRef, useState } from 'react';
import type { CsvReading, ResponseOutcome } from '../../../../../shared/imports/index.ts';
import { Button, TextField, icons } from '../../../../components/index.ts';
import { bringIn } from './curves.ts';

/** 256 points take less. */
const largestFile = 256 * 1024;

interface Asked {
  readonly name: string;
  readonly text: string;
  readonly question: Extract<ResponseOutcome, { kind: 'ask' }>['question'];
}

/** A curve of one's own: two columns from a file, or pasted. */
export function CurveText({ hasOwn }: { hasOwn: boolean }) {
  const [text, setText] = useState('');
  const [faults, setFaults] = useState<readonly string[]>([]);
  const [asked, setAsked] = useState<Asked | null>(null);
  const fileInput = useRef<HTMLInputElement>(null);
  const id = useId();

  const read = async (name: string, from: string, reading: CsvReading = {}) => {
    const { readCurveText } = await import('./read-curve-text.ts');
    const outcome = readCurveText(from, reading);
    setFaults(outcome.kind === 'faults' ? outcome.faults : []);
    setAsked(outcome.kind === 'ask' ? { name, text: from, question: outcome.question } : null);
    if (outcome.kind === 'read') bringIn(name, outcome.points);
  };
  const takeFile = async (file: File | undefined) => {
    if (file === undefined) return;
    if (file.size > largestFile) {
      setFaults([`${file.name} has ${file.size.toLocaleString('en')} bytes. Allowed: at most 256 kB.`]);
      return;
    }
    const whole = await file.text();
    setText(whole);
    await read(file.name.replace(/\.[^.]*$/, '') || 'Own curve', whole);
  };

  return (
    <div className="space-y-2">
      <input
        ref={fileInput}
        className="sr-only"
        type="file"
        accept=".csv,.tsv,.txt,text/csv,text/plain"
        tabIndex={-1}
        aria-label="File with a response curve"
        onChange={({ target }) => {
          void takeFile(target.files?.[0]);
          // So that the same file can be chosen again once it has been mended.
          target.value = '';
        }}
      />
      <TextField
        label={hasOwn ? 'Another curve in its place' : 'Own curve'}
        description="Two columns, frequency in Hz and level in dB, as in a CSV file; with or without a heading. Only levels against each other count."
        multiline
        isCode
        value={text}
        placeholder={'300, -3\n1000, 0\n3400, -3'}
        onChange={(next) => {
          setText(next);
          setFaults([]);
          setAsked(null);
        }}
        problem={
          faults.length > 0 && (
            <ul>
              {faults.map((fault) => (
                <li key={fault}>{fault}</li>
              ))}
            </ul>
          )
        }
      />
      {asked !== null && (
        <div role="group" aria-labelledby={`${id}-asked`} className="reasons">
          <p id={`${id}-asked`}>“{asked.question.cell}” can be read in two ways. Which is meant?</p>
          <div className="flex flex-wrap gap-2">
            {asked.question.answers.map(({ reading, shown }) => (
              <Button key={shown} size="small" onPress={() => void read(asked.name, asked.text, reading)}>
                {shown}
              </Button>
            ))}
          </div>
        </div>
      )}
      <div className="form-actions">
        <Button
          size="small"
          isDisabled={text.trim() === ''}
          disabledReason="Nothing has been typed or pasted"
          onPress={() => void read('Own curve', text)}
        >
          Take the text
        </Button>
        <Button size="small" icon={icons.upload} onPress={() => fileInput.current?.click()}>
          Choose a CSV file
        </Button>
      </div>
    </div>
  );
}
