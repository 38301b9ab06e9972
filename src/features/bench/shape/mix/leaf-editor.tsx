import type { LeafSource, Problem, Source } from '../../../../../shared/contract/index.ts';
import { ChoiceField, type SelectOption } from '../../../../components/index.ts';
import { FieldProblem } from '../../../../components/field-frame.tsx';
import { highestFitting } from '../bars.ts';
import type { OnChange } from '../change.ts';
import { sourceOfKind } from '../convert-any.ts';
import { HarmonicsEditor } from '../harmonics-editor.tsx';
import { PointsEditor } from '../points-editor.tsx';
import { problemAt } from '../problems.ts';
import { SamplesEditor } from '../samples/samples-editor.tsx';
import { SourcePath } from '../source-path.ts';

interface LeafEditorProps {
  /** Path of the part's source in the definition. */
  path: string;
  source: LeafSource;
  onChange: OnChange<Source>;
  /** Of this source alone, by paths that begin with `source`. */
  problems: readonly Problem[];
  tableLength: number;
  cycles: number;
  range: 'bipolar' | 'unipolar';
}

const kinds: readonly SelectOption<LeafSource['kind']>[] = [
  { value: 'harmonics', label: 'Harmonics' },
  { value: 'points', label: 'Points' },
  { value: 'samples', label: 'Samples' },
];

/** The editor of one part, the same as for a wave that is made of it alone. */
export function LeafEditor({ path, source, onChange, problems, ...frame }: LeafEditorProps) {
  const whole = problemAt(problems, 'source');
  const isSound = problems.length === 0;
  return (
    <SourcePath value={path}>
      <ChoiceField
        label="Made of"
        options={kinds}
        value={source.kind}
        onChange={(kind) =>
          onChange(sourceOfKind(kind, source, highestFitting(frame.tableLength, frame.cycles), isSound))
        }
      />
      <div aria-live="polite">{whole && <FieldProblem id={`${path}-problem`}>{whole}</FieldProblem>}</div>
      {source.kind === 'harmonics' && <HarmonicsEditor {...{ source, onChange, problems, ...frame }} />}
      {source.kind === 'points' && <PointsEditor {...{ source, onChange, problems, ...frame }} />}
      {source.kind === 'samples' && <SamplesEditor {...{ source, onChange, problems }} />}
    </SourcePath>
  );
}
