import { memo, useMemo } from 'react';
import {
  curveProblems,
  responseLimits,
  type ResponsePoint,
} from '../../../../../shared/listening/device-response.ts';
import { Button, IconButton, NumberField, icons } from '../../../../components/index.ts';
import { sayHere } from '../../problems/field-problem.tsx';
import { changePoints, type CurveId } from './curves.ts';
import { inOrder, pointAfter } from './points.ts';

interface CurveTableProps {
  id: CurveId;
  /** As they are typed: their order may be wrong. */
  points: readonly ResponsePoint[];
}

const { points: counts, hz: hzRange, db: dbRange } = responseLimits;

/** The points of a response curve in exact numbers. */
export function CurveTable({ id, points }: CurveTableProps) {
  const problems = curveProblems(points);
  const isFull = points.length >= counts.max;
  const wrong = (index: number, field: keyof ResponsePoint) => {
    const problem = problems.find(({ path }) => path === `points[${index}].${field}`);
    return problem && sayHere(problem);
  };
  const acts = useMemo(
    () => ({
      set: (index: number, part: Partial<ResponsePoint>) =>
        changePoints(id, (all) => all.map((point, k) => (k === index ? { ...point, ...part } : point))),
      insert: (index: number) =>
        changePoints(id, (all) => all.toSpliced(index + 1, 0, pointAfter(all, index))),
      remove: (index: number) => changePoints(id, (all) => all.toSpliced(index, 1)),
    }),
    [id],
  );
  return (
    <div className="curve-points">
      <table>
        <caption className="sr-only">Points of the curve</caption>
        <thead>
          <tr>
            <th scope="col">Frequency</th>
            <th scope="col">Level</th>
            <td />
          </tr>
        </thead>
        <tbody>
          {points.map((point, index) => (
            <PointRow
              key={index}
              {...{ index, point, isFull }}
              isNeeded={points.length <= counts.min}
              hzProblem={wrong(index, 'hz')}
              dbProblem={wrong(index, 'db')}
              {...acts}
            />
          ))}
        </tbody>
      </table>
      <div className="flex flex-wrap gap-2">
        <Button
          size="small"
          icon={icons.add}
          isDisabled={isFull}
          disabledReason={full}
          onPress={() => acts.insert(points.length - 1)}
        >
          Add a point at the end
        </Button>
        {problems.length > 0 && inOrder(points) !== null && (
          <Button size="small" onPress={() => changePoints(id, (all) => inOrder(all) ?? all)}>
            Put in order
          </Button>
        )}
      </div>
    </div>
  );
}

interface PointRowProps {
  index: number;
  point: ResponsePoint;
  isFull: boolean;
  isNeeded: boolean;
  hzProblem: string | undefined;
  dbProblem: string | undefined;
  set: (index: number, part: Partial<ResponsePoint>) => void;
  insert: (index: number) => void;
  remove: (index: number) => void;
}

const full = `A curve holds at most ${counts.max} points.`;

const PointRow = memo(function PointRow({ index, point, set, insert, remove, ...props }: PointRowProps) {
  const name = `point ${index + 1}`;
  return (
    <tr>
      <td>
        <NumberField
          hideLabel
          label={`Frequency of ${name}`}
          unit="Hz"
          {...hzRange}
          step={10}
          allowed={`a number of hertz from ${hzRange.min} to ${hzRange.max}, more than in the point before`}
          value={point.hz}
          onChange={(hz) => set(index, { hz })}
          problem={props.hzProblem}
        />
      </td>
      <td>
        <NumberField
          hideLabel
          label={`Level of ${name}`}
          unit="dB"
          {...dbRange}
          allowed={`a number of dB from ${dbRange.min} to ${dbRange.max}`}
          value={point.db}
          onChange={(db) => set(index, { db })}
          problem={props.dbProblem}
        />
      </td>
      <td>
        <div className="curve-acts">
          <IconButton
            size="small"
            label={`Insert a point after ${name}`}
            icon={icons.add}
            isDisabled={props.isFull}
            disabledReason={full}
            onPress={() => insert(index)}
          />
          <IconButton
            size="small"
            label={`Remove ${name}`}
            icon={icons.remove}
            isDisabled={props.isNeeded}
            disabledReason={`A curve needs at least ${counts.min} points.`}
            onPress={() => remove(index)}
          />
        </div>
      </td>
    </tr>
  );
});
