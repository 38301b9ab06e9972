import { memo, useState } from 'react';
import { limits, type Point, type PointsSource, type Problem } from '../../../../shared/contract/index.ts';
import { Button, IconButton, NumberField, icons } from '../../../components/index.ts';
import type { OnChange } from './change.ts';
import { Pager, lastPage, rowsOfPage } from './pager.tsx';
import { canBePutInOrder, insertAfter, putPointsInOrder, removePoint, setPoint } from './points.ts';
import { problemAt, rowsAtFault } from './problems.ts';
import { usePathTo } from './source-path.ts';
import { useLatest } from './use-latest.ts';

interface PointsTableProps {
  source: PointsSource;
  onChange: OnChange<PointsSource>;
  problems: readonly Problem[];
}

/** The points in exact numbers, a page at a time; x in cycles and, the same again, in degrees. */
export function PointsTable({ source, onChange, problems }: PointsTableProps) {
  const { points } = source;
  const pathTo = usePathTo();
  const [wantedPage, setPage] = useState(0);
  const page = Math.min(wantedPage, lastPage(points.length));
  const latest = useLatest({ source, onChange });
  const [edit] = useState(() => ({
    set: (index: number, name: keyof Point, value: number) =>
      latest.current.onChange(setPoint(latest.current.source, index, { [name]: value }), {
        coalesce: `source.points[${index}].${name}`,
      }),
    insert: (index: number) => latest.current.onChange(insertAfter(latest.current.source, index)),
    remove: (index: number) => latest.current.onChange(removePoint(latest.current.source, index)),
  }));

  const first = page * rowsOfPage;
  const faultElsewhere = rowsAtFault(problems, 'points').find(
    (row) => row < first || row >= first + rowsOfPage,
  );
  const fewest = source.interpolation === 'spline' ? limits.splinePoints.min : limits.points.min;
  const isFull = points.length >= limits.points.max;

  return (
    <div className="exact-list" data-path={pathTo('.points')}>
      <table className="exact-table points-table">
        <caption className="sr-only">Points in exact numbers</caption>
        <thead>
          <tr>
            <th scope="col">x, cycles</th>
            <th scope="col">x, degrees</th>
            <th scope="col">y</th>
            <td />
          </tr>
        </thead>
        <tbody>
          {points.slice(first, first + rowsOfPage).map((point, row) => (
            <PointRow
              key={first + row}
              index={first + row}
              point={point}
              isFull={isFull}
              isNeeded={points.length <= fewest}
              fewest={fewest}
              xProblem={problemAt(problems, `source.points[${first + row}].x`)}
              yProblem={problemAt(problems, `source.points[${first + row}].y`)}
              onSet={edit.set}
              onInsert={edit.insert}
              onRemove={edit.remove}
            />
          ))}
        </tbody>
      </table>
      <Pager what="points" count={points.length} page={page} onPage={setPage}>
        <Button
          size="small"
          icon={icons.add}
          isDisabled={isFull}
          disabledReason={`A wave holds at most ${limits.points.max} points.`}
          onPress={() => {
            setPage(lastPage(points.length + 1));
            onChange(insertAfter(source, points.length - 1));
          }}
        >
          Add a point at the end
        </Button>
        {canBePutInOrder(source) && (
          <Button size="small" onPress={() => onChange(putPointsInOrder(source))}>
            Put in order
          </Button>
        )}
      </Pager>
      {faultElsewhere !== undefined && (
        <Button size="small" onPress={() => setPage(Math.floor(faultElsewhere / rowsOfPage))}>
          Show point {faultElsewhere + 1}, which is not allowed
        </Button>
      )}
    </div>
  );
}

interface PointRowProps {
  index: number;
  point: Point;
  isFull: boolean;
  isNeeded: boolean;
  fewest: number;
  xProblem: string | undefined;
  yProblem: string | undefined;
  onSet: (index: number, name: keyof Point, value: number) => void;
  onInsert: (index: number) => void;
  onRemove: (index: number) => void;
}

const xAllowed = 'a number from 0 up to, not including, 1, more than the x before it';

const PointRow = memo(function PointRow(props: PointRowProps) {
  const { index, point, isFull, isNeeded, fewest, onSet, onInsert, onRemove } = props;
  const path = usePathTo()(`.points[${index}]`);
  const name = `point ${index + 1}`;
  return (
    <tr data-path={path}>
      <td data-path={`${path}.x`}>
        <NumberField
          hideLabel
          label={`x of ${name}, in cycles`}
          step={0.01}
          allowed={xAllowed}
          value={point.x}
          onChange={(value) => onSet(index, 'x', value)}
          problem={props.xProblem}
        />
      </td>
      <td>
        <NumberField
          hideLabel
          label={`x of ${name}, in degrees`}
          unit="°"
          step={1}
          allowed="a number of degrees from 0 up to, not including, 360"
          value={degreesOf(point.x)}
          onChange={(value) => onSet(index, 'x', value / 360)}
        />
      </td>
      <td data-path={`${path}.y`}>
        <NumberField
          hideLabel
          label={`y of ${name}`}
          step={0.01}
          allowed="a finite number"
          value={point.y}
          onChange={(value) => onSet(index, 'y', value)}
          problem={props.yProblem}
        />
      </td>
      <td>
        <div className="row-acts">
          <IconButton
            size="small"
            label={`Insert a point after ${name}`}
            icon={icons.add}
            isDisabled={isFull}
            disabledReason={`A wave holds at most ${limits.points.max} points.`}
            onPress={() => onInsert(index)}
          />
          <IconButton
            size="small"
            label={`Remove ${name}`}
            icon={icons.remove}
            isDisabled={isNeeded}
            disabledReason={`This curve needs at least ${fewest} points.`}
            onPress={() => onRemove(index)}
          />
        </div>
      </td>
    </tr>
  );
});

/** x in degrees, without the last bits that the multiplication leaves. */
function degreesOf(x: number): number {
  return Number((x * 360).toPrecision(12));
}
