import './size-search.css';
import { useMemo, useState } from 'react';
import type { Definition } from '../../../../shared/contract/index.ts';
import {
  paretoOf,
  smallestThatMeets,
  usualAxes,
  type SizeCell,
  type SizeFigure,
} from '../../../../shared/size-search/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import {
  Button,
  ChoiceField,
  Dialog,
  Explain,
  Notice,
  SwitchField,
  TextField,
  icons,
  useToast,
  type SelectOption,
} from '../../../components/index.ts';
import { saveText } from '../../../components/save-text.ts';
import { createLive, useLive } from '../../../live/index.ts';
import { changeDefinition, theBench } from '../state/use-bench.ts';
import { leavesOut } from './left-out.ts';
import { meets, readLimits, sayLimits } from './read-limits.ts';
import { SizeMapGrid, sayCell, type MapFigure } from './size-map.tsx';
import { useSearch } from './use-search.ts';

export interface SizeSearchDialogProps {
  /** The wave to search the sizes of; the dialog is shut where there is none. */
  definition: Definition | null;
  onClose: () => void;
}

/** Limits as they were typed last, for the next search. */
const limitsText = createLive('SNR ≥ 45 dB, ≤ 512 bytes');

const figures: readonly SelectOption<MapFigure>[] = [
  { value: 'snrDb', label: 'SNR', hint: 'In dB: the higher, the better. “=” is exact, “×” refused.' },
  {
    value: 'unwantedDb',
    label: 'Unwanted line',
    hint: 'In dB: the strongest line that quantising added, against the wave’s strongest. The lower, the better.',
  },
  { value: 'tableBytes', label: 'Size', hint: 'In bytes: a byte an entry up to 8 bits, two above.' },
];

export function SizeSearchDialog({ definition, onClose }: SizeSearchDialogProps) {
  const [keepsAll, setKeepsAll] = useState(true);
  return (
    <Dialog title="Find the smallest table" isOpen={definition !== null} size="wide" onClose={onClose}>
      {definition !== null && (
        <SizeSearch
          key={String(keepsAll)}
          {...{ definition, onClose, keepsAll }}
          onKeepsAllChange={setKeepsAll}
        />
      )}
    </Dialog>
  );
}

interface SizeSearchProps {
  definition: Definition;
  onClose: () => void;
  /** Whether lengths that leave partials out are passed over. */
  keepsAll: boolean;
  onKeepsAllChange: (keepsAll: boolean) => void;
}

/** All usual sizes of the wave on the bench with their figures, and the smallest that keeps what is asked of it. */
function SizeSearch({ definition, onClose, keepsAll, onKeepsAllChange }: SizeSearchProps) {
  const search = useSearch(definition, keepsAll);
  const { axes, cells, isRunning, fault } = search;
  const [figure, setFigure] = useState<MapFigure>('snrDb');
  const text = useLive(limitsText);
  const toast = useToast();
  const reading = readLimits(text);
  const limits = useMemo(() => {
    const read = readLimits(text);
    return 'limits' in read ? read.limits : null;
  }, [text]);
  const smallest = useMemo(
    () => (limits === null ? null : smallestThatMeets(cells, limits)),
    [cells, limits],
  );
  const total = axes.lengths.length * axes.bits.length;

  const take = (cell: SizeCell) => {
    changeDefinition((now) => ({
      ...now,
      table: { ...now.table, length: cell.tableLength, bits: cell.bits },
    }));
    onClose();
    toast({
      message: `The table has ${sayCell(cell)}.`,
      tone: 'good',
      action: { label: 'Undo', onPress: theBench().undo },
    });
  };

  return (
    <div className="space-y-4">
      <TextField
        label="Limits"
        value={text}
        onChange={(next) => limitsText.set(next)}
        description={'limits' in reading ? sayLimits(reading.limits) : undefined}
        problem={'fault' in reading ? reading.fault : undefined}
        autoComplete="off"
        aside={
          <Explain title="Limits">
            <p>
              What the table must keep: the least SNR, the highest unwanted line, the most bytes; any of them,
              parted by commas. Everything else of the wave stays as it is on the bench.
            </p>
            <p>
              Of the sizes that keep them the one of fewest bytes is taken; of one size that with fewer bits,
              then with fewer entries.
            </p>
          </Explain>
        }
      />
      <div role="status" className="size-progress">
        {fault !== null ? (
          <Notice tone="fault" title="The search ended">
            {fault}
          </Notice>
        ) : (
          <>
            <progress value={cells.length} max={total} aria-label="Sizes searched" />
            <span>
              {cells.length} of {total} sizes searched
              {isRunning ? '' : cells.length < total ? ', then stopped' : ''}.{' '}
              {!isRunning && limits !== null && sayOutcome(smallest)}
            </span>
          </>
        )}
      </div>
      <div className="flex flex-wrap gap-2">
        <Button
          variant="primary"
          isDisabled={smallest === null || isRunning}
          disabledReason={isRunning ? 'The search is still going on.' : 'No size keeps the limits.'}
          onPress={() => smallest !== null && take(smallest)}
        >
          Take the smallest that meets them
        </Button>
        {isRunning ? (
          <Button onPress={search.stop} icon={icons.stop}>
            Stop
          </Button>
        ) : (
          <Button onPress={search.begin}>Search again</Button>
        )}
      </div>
      <ChoiceField label="Shown" options={figures} value={figure} onChange={setFigure} />
      <SizeMapGrid
        {...{ axes, cells, figure, smallest }}
        isMet={(cell) => limits !== null && meets(cell, limits)}
        current={{ tableLength: definition.table.length, bits: definition.table.bits }}
        onTake={take}
      />
      {usualAxes.lengths.some((length) => leavesOut(definition, length)) && (
        <SwitchField
          label="Only lengths that hold every partial"
          isOn={keepsAll}
          onChange={onKeepsAllChange}
          description="A shorter table leaves the highest partials out, and its figures are those of the wave without them."
        />
      )}
      {!isRunning && cells.length > 0 && <Unbeaten cells={cells} figure={figure} onTake={take} />}
      <Button
        size="small"
        icon={icons.download}
        isDisabled={cells.length === 0}
        disabledReason="Nothing has been searched yet."
        onPress={() => saveText('stepwell-sizes.csv', csvOf(cells), 'text/csv')}
      >
        All sizes as CSV
      </Button>
    </div>
  );
}

function sayOutcome(smallest: SizeCell | null): string {
  return smallest === null
    ? 'None keeps the limits.'
    : `The smallest that keeps the limits: ${sayCell(smallest)}.`;
}

/** Sizes that no smaller table equals: the ones worth choosing among. */
function Unbeaten({
  cells,
  figure,
  onTake,
}: {
  cells: readonly SizeCell[];
  figure: MapFigure;
  onTake: (cell: SizeCell) => void;
}) {
  const by: SizeFigure = figure === 'unwantedDb' ? 'unwantedDb' : 'snrDb';
  const front = useMemo(() => paretoOf(cells, by), [cells, by]);
  const db = (value: number | null) => formatQuantity(value, 'dB', { decimals: 1 });
  return (
    <details className="size-unbeaten">
      <summary>
        {front.length} sizes that no smaller table equals in {by === 'snrDb' ? 'SNR' : 'its unwanted line'}
      </summary>
      <table>
        <thead>
          <tr>
            <th scope="col">Bytes</th>
            <th scope="col">Entries</th>
            <th scope="col">Bits</th>
            <th scope="col">SNR</th>
            <th scope="col">Unwanted</th>
            <td />
          </tr>
        </thead>
        <tbody>
          {front.map((cell) => (
            <tr key={cell.tableBytes}>
              <th scope="row">{cell.tableBytes.toLocaleString('en')}</th>
              <td>{cell.tableLength.toLocaleString('en')}</td>
              <td>{cell.bits}</td>
              <td>{cell.exact ? 'exact' : db(cell.snrDb)}</td>
              <td>{cell.exact ? 'none' : db(cell.unwantedDb)}</td>
              <td>
                <Button
                  size="small"
                  aria-label={`Use ${cell.tableLength} entries of ${cell.bits} bits`}
                  onPress={() => onTake(cell)}
                >
                  Use
                </Button>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </details>
  );
}

function csvOf(cells: readonly SizeCell[]): string {
  const rows = cells.map(({ tableLength, bits, snrDb, unwantedDb, exact, tableBytes, problem }) =>
    problem === null
      ? `${tableLength},${bits},${snrDb ?? ''},${unwantedDb ?? ''},${exact},${tableBytes},`
      : `${tableLength},${bits},,,,,${problem.path}`,
  );
  return `table_length,bits,snr_db,unwanted_db,exact,table_bytes,refused_by\n${rows.join('\n')}\n`;
}
