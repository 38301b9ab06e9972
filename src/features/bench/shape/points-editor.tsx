import type { ReactNode } from 'react';
import type { PointsSource, Problem } from '../../../../shared/contract/index.ts';
import { SelectField, SwitchField, type SelectOption } from '../../../components/index.ts';
import type { OnChange } from './change.ts';
import { PointsTable } from './points-table.tsx';
import { problemAt } from './problems.ts';
import { Sketch } from './sketches.tsx';
import { usePathTo } from './source-path.ts';
import { pointStarts, pointsStart, type PointStart, type TableFrame } from './starts.ts';

interface PointsEditorProps extends TableFrame {
  source: PointsSource;
  onChange: OnChange<PointsSource>;
  problems: readonly Problem[];
  moreStarts?: ReactNode;
}

const startNames: Record<PointStart, string> = {
  ramp: 'Ramp',
  step: 'Step',
  trapezoid: 'Trapezoid',
  fade: 'Fade',
};

const interpolations: readonly SelectOption<PointsSource['interpolation']>[] = [
  { value: 'step', label: 'Step', hint: 'Holds each value until the next point.' },
  { value: 'linear', label: 'Linear', hint: 'Straight lines from point to point.' },
  {
    value: 'monotone',
    label: 'Monotone cubic',
    hint: 'Smooth, and never beyond the points: flat between equal ones.',
  },
  {
    value: 'spline',
    label: 'Spline',
    hint: 'The smoothest curve, without a kink in slope or bend; it may swing beyond the points. At least 3 points.',
  },
];

/** A wave as a closed curve through points. */
export function PointsEditor(props: PointsEditorProps) {
  const { source, onChange, problems, range, tableLength, cycles, moreStarts } = props;
  const pathTo = usePathTo();
  return (
    <div className="space-y-4">
      <div className="start-stones" role="group" aria-label="Curves to start from">
        {pointStarts.map((start) => (
          <button
            key={start}
            type="button"
            className="start-stone"
            onClick={() => onChange(pointsStart(start, { range, tableLength, cycles }))}
          >
            <Sketch of={start} />
            {startNames[start]}
          </button>
        ))}
      </div>
      {moreStarts !== undefined && <div className="recesses">{moreStarts}</div>}
      <div data-path={pathTo('.interpolation')}>
        <SelectField
          label="Between the points"
          options={interpolations}
          value={source.interpolation}
          onChange={(interpolation) => onChange({ ...source, interpolation })}
          problem={problemAt(problems, 'source.interpolation') ?? problemAt(problems, 'source.points')}
        />
      </div>
      <SwitchField
        label="Band-limit the curve"
        isOn={source.bandlimit}
        onChange={(bandlimit) => onChange({ ...source, bandlimit })}
        description="Takes away the harmonics that the table cannot hold, so that corners and steps do not fold back as wrong tones. Edges then ring a little."
      />
      <p className="field-description">
        {pathTo('') === 'source'
          ? 'Drag the points on the drawing of the cycle, or set them here.'
          : 'Set the points here; the drawing of the cycle shows the whole mix.'}{' '}
        The curve closes: after the last point it goes on to the first.
      </p>
      <PointsTable source={source} onChange={onChange} problems={problems} />
    </div>
  );
}
