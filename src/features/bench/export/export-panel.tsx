import { useMemo, useState } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import { arrayNameFrom, targets } from '../../../../shared/firmware/index.ts';
import { OptionGroups } from '../../../components/code/index.ts';
import { SelectField } from '../../../components/index.ts';
import { useSettled } from '../../../components/use-settled.ts';
import { useCalmTable } from '../state/tables.ts';
import { theBench, useBench } from '../state/use-bench.ts';
import { useBoardAt } from '../stage/chosen-board.ts';
import { useStageBoard } from '../stage/use-stage-board.ts';
import { BoardOptions } from './board-options.tsx';
import { ExportedFiles } from './exported-files.tsx';
import { ExportProblems } from './export-problems.tsx';
import { givenOptions, renderExport, type TypedOptions } from './render-export.ts';

export interface ExportPanelProps {
  /** Brings the field at a path of the definition into sight. */
  onGoTo: (path: string) => void;
}

/** A wave that is being dragged is rendered once it rests, in milliseconds. */
const restMs = 150;

const noOptions = {};

export function ExportPanel({ onGoTo }: ExportPanelProps) {
  const table = useSettled(useCalmTable(), restMs);
  const isStale = useBench(({ problems }) => problems.length > 0);
  const targetId = useBench(({ history }) => history.present.exporting.target);
  const typed = useBench(({ history }) => history.present.exporting.options[targetId]) ?? noOptions;
  const [selected, setSelected] = useState('');
  const board = useChosenBoard();

  const options = useMemo(() => givenOptions(typed), [typed]);
  const rendered = useMemo(
    () => (table === null ? null : renderExport(table, targetId, options)),
    [table, targetId, options],
  );
  if (table === null || rendered === null) return <p role="status">No table has been built yet.</p>;

  const target = targets.find(({ id }) => id === targetId);
  const problems = 'problems' in rendered ? rendered.problems : [];
  return (
    <div className="space-y-4">
      <SelectField
        label="Target"
        value={targetId}
        options={targets.map(({ id, title }) => ({ value: id, label: title }))}
        onChange={setTarget}
      />
      {target !== undefined && board !== null && (
        <BoardOptions {...{ board, target, typed }} onTake={setOptions} />
      )}
      {target !== undefined && (
        <OptionGroups
          target={target}
          typed={typed}
          fallbacks={{ arrayName: arrayNameFrom(table.definition.name) }}
          problemOf={(name) => {
            const problem = problems.find(({ path }) => path === `options.${name}`);
            return problem && `${problem.value} is not allowed. Allowed: ${problem.allowed}.`;
          }}
          onChange={setOption}
        />
      )}
      <ExportProblems problems={problems} onGoTo={onGoTo} />
      {isStale && <p className="figure-note">These are the files of the last wave that could be built.</p>}
      {'files' in rendered && (
        <ExportedFiles
          {...{ table, targetId, options, selected }}
          budget={
            board?.flashBytes === undefined ? null : { boardName: board.name, flashBytes: board.flashBytes }
          }
          files={rendered.files}
          onSelect={setSelected}
        />
      )}
    </div>
  );
}

function setTarget(target: string): void {
  theBench().change((work) => ({ ...work, exporting: { ...work.exporting, target } }));
}

/** The team's board that the output is shown for; null for the example, whose pins are made up. */
function useChosenBoard(): Board | null {
  const { at } = useBoardAt();
  const shown = useStageBoard();
  return at !== null && shown.kind === 'there' ? shown.board : null;
}

function setOption(name: string, value: string): void {
  change({ [name]: value }, `export.${name}`);
}

function setOptions(changed: TypedOptions): void {
  change(changed);
}

function change(changed: TypedOptions, coalesce?: string): void {
  theBench().change(
    ({ exporting, ...work }) => {
      const { target, options } = exporting;
      return {
        ...work,
        exporting: { target, options: { ...options, [target]: { ...options[target], ...changed } } },
      };
    },
    coalesce === undefined ? undefined : { coalesce },
  );
}
