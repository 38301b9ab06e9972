import { useState } from 'react';
import type { HarmonicsSource, Problem } from '../../../../shared/contract/index.ts';
import {
  Button,
  ChoiceField,
  Explain,
  NumberField,
  SelectField,
  type SelectOption,
} from '../../../components/index.ts';
import { BarField } from './bar-field.tsx';
import { barsOf, highestFitting as highestOf, mergeDoubles } from './bars.ts';
import type { Reach } from './bar-scale.ts';
import type { OnChange } from './change.ts';
import { PartialsTable } from './partials-table.tsx';
import { problemAt } from './problems.ts';
import { ShapeStarts } from './shape-starts.tsx';
import { usePathTo } from './source-path.ts';

interface HarmonicsEditorProps {
  source: HarmonicsSource;
  onChange: OnChange<HarmonicsSource>;
  problems: readonly Problem[];
  tableLength: number;
  cycles: number;
}

type Extent = '16' | '32' | '64' | 'all';

const extents: readonly SelectOption<Extent>[] = [
  { value: '16', label: '16' },
  { value: '32', label: '32' },
  { value: '64', label: '64' },
  { value: 'all', label: 'All' },
];

const reachOptions: readonly SelectOption<Reach>[] = [
  { value: 'all', label: 'As needed' },
  { value: '0.3', label: '±0.3' },
  { value: '0.1', label: '±0.1' },
  { value: '0.03', label: '±0.03' },
  { value: '0.01', label: '±0.01' },
];

/** A wave as a sum of sines: shapes to start from, bars to draw on, exact numbers. */
export function HarmonicsEditor({ source, onChange, problems, tableLength, cycles }: HarmonicsEditorProps) {
  const pathTo = usePathTo();
  const [extent, setExtent] = useState<Extent>('16');
  const [reach, setReach] = useState<Reach>('all');
  const fitting = highestOf(tableLength, cycles);
  const highest = source.partials.reduce((most, { harmonic }) => Math.max(most, harmonic), 1);
  const shown = extent === 'all' ? Math.max(fitting, highest, 16) : Number(extent);
  const outOfSight = source.partials.filter(({ harmonic }) => harmonic > shown).length;
  const doubles = [...barsOf(source.partials)].filter(([, { count }]) => count > 1);

  return (
    <div className="space-y-4">
      <ShapeStarts source={source} onChange={onChange} highestFitting={fitting} />
      <div className="bar-views">
        <ChoiceField label="Harmonics shown" value={extent} options={extents} onChange={setExtent} />
        <SelectField label="Full height" value={reach} options={reachOptions} onChange={setReach} />
      </div>
      <BarField source={source} onChange={onChange} shown={shown} highestFitting={fitting} reach={reach} />
      {outOfSight > 0 && (
        <p className="field-description">
          {outOfSight === 1 ? 'One partial lies' : `${outOfSight} partials lie`} beyond harmonic {shown}.
        </p>
      )}
      {doubles.length > 0 && (
        <div className="shape-note">
          <p>
            {doubles.length === 1
              ? `Harmonic ${doubles[0][0]} has more than one partial`
              : `${doubles.length} harmonics have more than one partial`}
            ; a bar moves the first.
          </p>
          <Button size="small" onPress={() => onChange(mergeDoubles(source))}>
            Add them together
          </Button>
        </div>
      )}
      <PartialsTable source={source} onChange={onChange} problems={problems} highestFitting={fitting} />
      <div data-path={pathTo('.offset')}>
        <NumberField
          label="Offset"
          step={0.01}
          allowed="a finite number"
          description="A constant added to the sum of the partials: its mean."
          aside={
            <Explain title="Harmonics">
              <p>f(t) = offset + Σ amplitude · sin(2π · harmonic · t + phase), t in cycles.</p>
              <p>
                A table of N entries with K cycles holds harmonics below N/(2K), here up to{' '}
                {fitting.toLocaleString('en')}. What lies above is left out and marked.
              </p>
            </Explain>
          }
          value={source.offset}
          onChange={(offset) => onChange({ ...source, offset }, { coalesce: 'source.offset' })}
          problem={problemAt(problems, 'source.offset')}
        />
      </div>
    </div>
  );
}
