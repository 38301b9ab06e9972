import { TextField } from '../../../components/index.ts';
import { readTone, sayTone } from './read-tone.ts';

interface ToneFieldProps {
  label: string;
  /** As it was typed. */
  text: string;
  onChange: (text: string) => void;
  problem?: string | undefined;
  /** What pitches are tuned to; 440 Hz where absent. */
  a4Hz?: number;
}

/** A tone by its frequency or the name of its pitch; what was typed stays as it is. */
export function ToneField({ label, text, onChange, problem, a4Hz }: ToneFieldProps) {
  const reading = readTone(text, a4Hz);
  return (
    <TextField
      label={label}
      value={text}
      onChange={onChange}
      autoComplete="off"
      description={'hz' in reading ? sayTone(reading.hz, a4Hz) : 'As 440 Hz or A4.'}
      problem={'fault' in reading ? reading.fault : problem}
    />
  );
}
