import './fades.css';
import { useState } from 'react';
import { Refusal, type Definition } from '../../../../../shared/contract/index.ts';
import { fade, type FadeOptions } from '../../../../../shared/fades/index.ts';
import {
  Button,
  ChoiceField,
  Explain,
  NumberField,
  SelectField,
  type SelectOption,
} from '../../../../components/index.ts';
import { CycleSketch } from '../cycle-sketch.tsx';

const shapes: readonly SelectOption<FadeOptions['shape']>[] = [
  {
    value: 'perceptual',
    label: 'Even to the eye',
    hint: 'Equal steps of CIE 1976 lightness: the fade looks steady from end to end.',
  },
  {
    value: 'exponential',
    label: 'Exponential',
    hint: 'Equal ratios of luminance from entry to entry; it never comes to full dark.',
  },
  { value: 'linear', label: 'Linear', hint: 'Equal steps of luminance: it looks fast at the dark end.' },
];

const ways: readonly SelectOption<FadeOptions['way']>[] = [
  { value: 'there-and-back', label: 'There and back', hint: 'A loop that begins and ends dark.' },
  { value: 'up', label: 'Up', hint: 'From dark to full, once.' },
  { value: 'down', label: 'Down', hint: 'From full to dark, once.' },
];

export interface FadeStartsProps {
  tableLength: number;
  onStart: (change: (definition: Definition) => Definition) => void;
}

/** Fades of a lamp to start from. They settle level and range too, as a luminance has no sign. */
export function FadeStarts({ tableLength, onStart }: FadeStartsProps) {
  const [shape, setShape] = useState<FadeOptions['shape']>('perceptual');
  const [way, setWay] = useState<FadeOptions['way']>('there-and-back');
  const [ratio, setRatio] = useState(100);
  const made = make({ shape, way, ratio, length: tableLength });
  return (
    <>
      <SelectField
        label="Fade"
        options={shapes}
        value={shape}
        onChange={setShape}
        aside={
          <Explain title="Fades">
            <p>
              The eye tells ratios of light, not differences. Even to the eye: the signal is a lightness and
              the transfer curve makes luminance of it (CIE 1976). Exponential: <code>ratio^(u − 1)</code>, u
              from 0 to 1.
            </p>
            <p>
              At the dark end both take small steps: below 10 bits of duty they show as a flicker or a jump.
            </p>
          </Explain>
        }
      />
      <ChoiceField label="Way" options={ways} value={way} onChange={setWay} />
      {shape === 'exponential' && (
        <NumberField
          label="Brightest to darkest"
          min={1.01}
          max={1e6}
          step={10}
          allowed="a ratio from 1.01 to 1000000"
          description="How many times brighter the bright end is."
          value={ratio}
          onChange={setRatio}
        />
      )}
      {'fault' in made ? (
        <p className="figure-note">{made.fault}</p>
      ) : (
        <div className="fade-start">
          <CycleSketch source={made.source} isSound />
          <Button size="small" onPress={() => onStart(withFade(made))}>
            Start from this fade
          </Button>
          <p className="field-description">
            Makes the range unipolar, sets level and transfer, and begins the table at phase 0.
          </p>
        </div>
      )}
    </>
  );
}

function make(options: FadeOptions): ReturnType<typeof fade> | { fault: string } {
  try {
    return fade(options);
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    return { fault: 'No fade for a table length that is not allowed.' };
  }
}

/** The whole of what a fade settles. */
export function withFade({ source, level }: ReturnType<typeof fade>) {
  return (definition: Definition): Definition => ({
    ...definition,
    source,
    level,
    table: {
      ...definition.table,
      range: 'unipolar',
      scale: 'full-span',
      cycles: 1,
      sampleAt: 'start',
      startPhaseDeg: 0,
      fold: 'none',
    },
  });
}
