import type { ReactNode } from 'react';
import type { Problem, Source } from '../../../../shared/contract/index.ts';
import { ChoiceField, type SelectOption } from '../../../components/index.ts';
import { FieldProblem } from '../../../components/field-frame.tsx';
import { highestFitting } from './bars.ts';
import type { OnChange } from './change.ts';
import { HarmonicsEditor } from './harmonics-editor.tsx';
import { PointsEditor } from './points-editor.tsx';
import { problemAt } from './problems.ts';
import { useKeptWork, type Kind } from './use-kept-work.ts';
import { later } from '../view/later.tsx';
import './shape.css';

export interface ShapeFlightProps {
  source: Source;
  onChange: OnChange;
  /** What is wrong with the definition; those of paths under `source` are shown here. */
  problems: readonly Problem[];
  tableLength: number;
  cycles: number;
  range: 'bipolar' | 'unipolar';
  /** More to start a curve from than a source alone, below the starts. */
  moreStarts?: ReactNode;
}

const kinds: Record<Kind, SelectOption<Kind>> = {
  harmonics: {
    value: 'harmonics',
    label: 'Harmonics',
    hint: 'A sum of sines: for tones, and for standard shapes that stay clean.',
  },
  points: {
    value: 'points',
    label: 'Points',
    hint: 'A curve through points: for ramps, fades and waves drawn by hand.',
  },
  samples: { value: 'samples', label: 'Samples', hint: 'One recorded cycle, value by value.' },
  mix: { value: 'mix', label: 'Mix', hint: 'Several of these, added or multiplied.' },
};

const MixEditor = later('the mix', async () => (await import('./mix/mix-editor.tsx')).MixEditor);
const SamplesEditor = later(
  'the samples',
  async () => (await import('./samples/samples-editor.tsx')).SamplesEditor,
);

/** The first flight: what the wave is made of. */
export function ShapeFlight(props: ShapeFlightProps) {
  const { source, onChange, problems, tableLength, cycles, range } = props;
  const kept = useKeptWork(source, onChange);
  const isSound = !problems.some(({ path }) => path.startsWith('source'));
  const wholeProblem = problemAt(problems, 'source');
  const change: OnChange = (next, how) => kept.change(source, next, how);
  const frame = { problems, tableLength, cycles, range };

  return (
    <div className="shape-flight space-y-4">
      <ChoiceField
        label="Made of"
        value={source.kind}
        options={Object.values(kinds)}
        onChange={(kind) => kept.goTo(source, kind, highestFitting(tableLength, cycles), isSound)}
      />
      <div aria-live="polite">
        {wholeProblem && <FieldProblem id="source-problem">{wholeProblem}</FieldProblem>}
      </div>
      {source.kind === 'harmonics' && <HarmonicsEditor {...frame} source={source} onChange={change} />}
      {source.kind === 'points' && (
        <PointsEditor {...frame} source={source} onChange={change} moreStarts={props.moreStarts} />
      )}
      {source.kind === 'samples' && <SamplesEditor source={source} onChange={change} problems={problems} />}
      {source.kind === 'mix' && <MixEditor {...frame} source={source} onChange={change} />}
    </div>
  );
}
