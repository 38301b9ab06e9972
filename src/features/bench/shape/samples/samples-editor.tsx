import './samples.css';
import { useMemo, useState } from 'react';
import { limits, type Problem, type SamplesSource } from '../../../../../shared/contract/index.ts';
import {
  Button,
  Explain,
  IconButton,
  NumberField,
  SelectField,
  icons,
  type SelectOption,
} from '../../../../components/index.ts';
import type { OnChange } from '../change.ts';
import { Pager, lastPage, rowsOfPage } from '../pager.tsx';
import { problemAt, rowsAtFault } from '../problems.ts';
import { usePathTo } from '../source-path.ts';
import { SamplesDrawing } from './samples-drawing.tsx';

interface SamplesEditorProps {
  source: SamplesSource;
  onChange: OnChange<SamplesSource>;
  problems: readonly Problem[];
}

const resamplings: readonly SelectOption<SamplesSource['resampling']>[] = [
  {
    value: 'bandlimited',
    label: 'Band-limited',
    hint: 'The smooth curve of the fewest harmonics through all samples; nothing that the table cannot hold is kept.',
  },
  {
    value: 'linear',
    label: 'Straight lines',
    hint: 'Neighbours are joined by lines: corners stay, with their harmonics.',
  },
  {
    value: 'hold',
    label: 'Held',
    hint: 'Each sample lasts until the next: a table of the same length holds the very values.',
  },
];

/** One recorded cycle: drawn, and its values to look up and set. */
export function SamplesEditor({ source, onChange, problems }: SamplesEditorProps) {
  const pathTo = usePathTo();
  const count = source.values.length;
  return (
    <div className="space-y-4">
      <SamplesDrawing source={source} isSound={problems.length === 0} />
      <div data-path={pathTo('.resampling')}>
        <SelectField
          label="Resampled"
          options={resamplings}
          value={source.resampling}
          onChange={(resampling) => onChange({ ...source, resampling })}
          problem={problemAt(problems, 'source.resampling')}
          aside={
            <Explain title="Resampling">
              <p>
                {count.toLocaleString('en')} samples M of one cycle come to the table’s N entries.
                Band-limited evaluates the trigonometric polynomial through them, harmonics m {'<'} min(M/2,
                N/2K); lines join neighbours round the seam; held takes <code>values[⌊t·M⌋]</code>.
              </p>
              <p>
                Take band-limited for sound, lines for slow curves, held for values that must stay as they
                are.
              </p>
            </Explain>
          }
        />
      </div>
      <ValuesTable source={source} onChange={onChange} problems={problems} />
    </div>
  );
}

function ValuesTable({ source, onChange, problems }: SamplesEditorProps) {
  const pathTo = usePathTo();
  const { values } = source;
  const [wantedPage, setPage] = useState(0);
  const page = Math.min(wantedPage, lastPage(values.length));
  const first = page * rowsOfPage;
  const isFull = values.length >= limits.samples.max;
  const isNeeded = values.length <= limits.samples.min;
  const faultElsewhere = useMemo(() => rowsAtFault(problems, 'values'), [problems]).find(
    (row) => row < first || row >= first + rowsOfPage,
  );
  return (
    <div className="exact-list" data-path={pathTo('.values')}>
      <table className="exact-table samples-table">
        <caption className="sr-only">Samples in exact numbers</caption>
        <thead>
          <tr>
            <th scope="col">Sample</th>
            <th scope="col">Place, cycles</th>
            <th scope="col">Value</th>
            <td />
          </tr>
        </thead>
        <tbody>
          {values.slice(first, first + rowsOfPage).map((value, row) => {
            const index = first + row;
            const name = `sample ${index + 1}`;
            return (
              <tr key={index} data-path={pathTo(`.values[${index}]`)}>
                <th scope="row">{(index + 1).toLocaleString('en')}</th>
                <td className="exact-told">{Number((index / values.length).toPrecision(6))}</td>
                <td>
                  <NumberField
                    hideLabel
                    label={`Value of ${name}`}
                    step={0.01}
                    allowed="a finite number"
                    value={value}
                    onChange={(next) =>
                      onChange(
                        { ...source, values: values.with(index, next) },
                        { coalesce: `source.values[${index}]` },
                      )
                    }
                    problem={problemAt(problems, `source.values[${index}]`)}
                  />
                </td>
                <td>
                  <div className="row-acts">
                    <IconButton
                      size="small"
                      label={`Insert a sample after ${name}`}
                      icon={icons.add}
                      isDisabled={isFull}
                      disabledReason={`A cycle holds at most ${limits.samples.max.toLocaleString('en')} samples.`}
                      onPress={() =>
                        onChange({ ...source, values: values.toSpliced(index + 1, 0, values[index]) })
                      }
                    />
                    <IconButton
                      size="small"
                      label={`Remove ${name}`}
                      icon={icons.remove}
                      isDisabled={isNeeded}
                      disabledReason={`A cycle needs at least ${limits.samples.min} samples.`}
                      onPress={() => onChange({ ...source, values: values.toSpliced(index, 1) })}
                    />
                  </div>
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
      <Pager what="samples" count={values.length} page={page} onPage={setPage} />
      {faultElsewhere !== undefined && (
        <Button size="small" onPress={() => setPage(Math.floor(faultElsewhere / rowsOfPage))}>
          Show sample {faultElsewhere + 1}, which is not allowed
        </Button>
      )}
    </div>
  );
}
