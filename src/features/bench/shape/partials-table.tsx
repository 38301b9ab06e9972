import { memo, useState } from 'react';
import {
  limits,
  type HarmonicsSource,
  type Partial,
  type Problem,
} from '../../../../shared/contract/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, IconButton, NumberField, icons } from '../../../components/index.ts';
import { addPartial, isInOrder, putInOrder, removePartial, setPartial } from './bars.ts';
import { relativeDb } from './bar-scale.ts';
import type { OnChange } from './change.ts';
import { Pager, lastPage, rowsOfPage } from './pager.tsx';
import { problemAt, rowsAtFault } from './problems.ts';
import { usePathTo } from './source-path.ts';
import { useLatest } from './use-latest.ts';

interface PartialsTableProps {
  source: HarmonicsSource;
  onChange: OnChange<HarmonicsSource>;
  problems: readonly Problem[];
  highestFitting: number;
}

/** The partials in exact numbers, a page at a time. Rows keep the order of the definition while they are edited. */
export function PartialsTable({ source, onChange, problems, highestFitting }: PartialsTableProps) {
  const { partials } = source;
  const pathTo = usePathTo();
  const [wantedPage, setPage] = useState(0);
  const page = Math.min(wantedPage, lastPage(partials.length));
  const latest = useLatest({ source, onChange });
  const [edit] = useState(() => ({
    set: (index: number, name: keyof Partial, value: number) =>
      latest.current.onChange(setPartial(latest.current.source, index, { [name]: value }), {
        coalesce: `source.partials[${index}].${name}`,
      }),
    remove: (index: number) => latest.current.onChange(removePartial(latest.current.source, index)),
  }));

  const strongest = partials.reduce((most, { amplitude }) => Math.max(most, Math.abs(amplitude)), 0);
  const first = page * rowsOfPage;
  const faultElsewhere = rowsAtFault(problems, 'partials').find(
    (row) => row < first || row >= first + rowsOfPage,
  );
  const isFull = partials.length >= limits.partials.max;

  return (
    <div className="exact-list" data-path={pathTo('.partials')}>
      <table className="exact-table partials-table">
        <caption className="sr-only">Partials in exact numbers</caption>
        <thead>
          <tr>
            <th scope="col">Harmonic</th>
            <th scope="col">Amplitude</th>
            <th scope="col">Level</th>
            <th scope="col">Phase</th>
            <td />
          </tr>
        </thead>
        <tbody>
          {partials.slice(first, first + rowsOfPage).map((partial, row) => (
            <PartialRow
              key={first + row}
              index={first + row}
              partial={partial}
              strongest={strongest}
              isLeftOut={partial.harmonic > highestFitting}
              isOnly={partials.length === 1}
              harmonicProblem={problemAt(problems, `source.partials[${first + row}].harmonic`)}
              amplitudeProblem={problemAt(problems, `source.partials[${first + row}].amplitude`)}
              phaseProblem={problemAt(problems, `source.partials[${first + row}].phaseDeg`)}
              onSet={edit.set}
              onRemove={edit.remove}
            />
          ))}
        </tbody>
      </table>
      <Pager what="partials" count={partials.length} page={page} onPage={setPage}>
        <Button
          size="small"
          icon={icons.add}
          isDisabled={isFull}
          disabledReason={`A wave holds at most ${limits.partials.max} partials.`}
          onPress={() => {
            const next = addPartial(source);
            setPage(lastPage(next.partials.length));
            onChange(next);
          }}
        >
          Add a partial
        </Button>
        {!isInOrder(partials) && (
          <Button size="small" variant="quiet" onPress={() => onChange(putInOrder(source))}>
            Put in order
          </Button>
        )}
      </Pager>
      {faultElsewhere !== undefined && (
        <Button size="small" onPress={() => setPage(Math.floor(faultElsewhere / rowsOfPage))}>
          Show partial {faultElsewhere + 1}, which is not allowed
        </Button>
      )}
    </div>
  );
}

interface PartialRowProps {
  index: number;
  partial: Partial;
  strongest: number;
  isLeftOut: boolean;
  isOnly: boolean;
  harmonicProblem: string | undefined;
  amplitudeProblem: string | undefined;
  phaseProblem: string | undefined;
  onSet: (index: number, name: keyof Partial, value: number) => void;
  onRemove: (index: number) => void;
}

const PartialRow = memo(function PartialRow(props: PartialRowProps) {
  const { index, partial, strongest, isLeftOut, isOnly, onSet, onRemove } = props;
  const { harmonic, amplitude, phaseDeg } = partial;
  const path = usePathTo()(`.partials[${index}]`);
  return (
    <tr data-path={path}>
      <td data-path={`${path}.harmonic`}>
        <NumberField
          hideLabel
          label={`Harmonic of partial ${index + 1}`}
          isInteger
          allowed={`a whole number from ${limits.harmonic.min} to ${limits.harmonic.max}`}
          value={harmonic}
          onChange={(value) => onSet(index, 'harmonic', value)}
          problem={props.harmonicProblem}
        />
      </td>
      <td data-path={`${path}.amplitude`}>
        <NumberField
          hideLabel
          label={`Amplitude of partial ${index + 1}, harmonic ${harmonic}`}
          step={0.01}
          allowed="a finite number, or dB as in −6 dB"
          value={amplitude}
          onChange={(value) => onSet(index, 'amplitude', value)}
          problem={props.amplitudeProblem}
        />
      </td>
      <td className="exact-told">
        {isLeftOut ? <LeftOut /> : <LevelTold amplitude={amplitude} strongest={strongest} />}
      </td>
      <td data-path={`${path}.phaseDeg`}>
        <NumberField
          hideLabel
          label={`Phase of partial ${index + 1}, harmonic ${harmonic}`}
          unit="°"
          step={1}
          allowed="a finite number of degrees"
          value={phaseDeg}
          onChange={(value) => onSet(index, 'phaseDeg', value)}
          problem={props.phaseProblem}
        />
      </td>
      <td>
        <IconButton
          size="small"
          label={`Remove partial ${index + 1}, harmonic ${harmonic}`}
          icon={icons.remove}
          isDisabled={isOnly}
          disabledReason="A wave needs at least one partial."
          onPress={() => onRemove(index)}
        />
      </td>
    </tr>
  );
});

function LevelTold({ amplitude, strongest }: { amplitude: number; strongest: number }) {
  if (amplitude === 0) return '−∞ dB';
  const level = relativeDb(amplitude, strongest);
  return formatQuantity(level, 'dB', { decimals: level > -100 ? 1 : 0 });
}

function LeftOut() {
  return <span className="exact-left-out">left out</span>;
}
