import { useMemo, useState } from 'react';
import {
  arrayNameFrom,
  boardOptionsFor,
  boardShare,
  pulsesOptionFor,
  targets,
} from '../../../../shared/firmware/index.ts';
import { OptionGroups } from '../../../components/code/index.ts';
import { SelectField } from '../../../components/index.ts';
import { ProblemNotice } from '../../../forms/problem-notice.tsx';
import { useSettled } from '../../../components/use-settled.ts';
import { useCalmTable } from '../state/tables.ts';
import { useBench } from '../state/use-bench.ts';
import { useBoardAt } from '../stage/chosen-board.ts';
import { useStageBoard, type StageBoard } from '../stage/use-stage-board.ts';
import { BoardOptions } from './board-options.tsx';
import { originFrom } from './board-origins.tsx';
import { setOptions, setTarget } from './export-choice.ts';
import { ExportedFiles } from './exported-files.tsx';
import { ExportProblems } from './export-problems.tsx';
import { PulsesNote } from './pulses-note.tsx';
import { givenOptions, renderExport } from './render-export.ts';

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
  const chosen = useChosenBoard();
  const board = chosen?.kind === 'there' ? chosen.board : null;

  const pattern = useBench(({ history }) => history.present.playback.pattern);
  const target = targets.find(({ id }) => id === targetId);

  // The pattern that is kept with the table goes into the files where nothing else is given.
  const ofPattern = useMemo(
    () => (target === undefined ? {} : pulsesOptionFor(target, pattern)),
    [target, pattern],
  );
  // The board first, options by hand over it: as on the command line.
  const ofBoard = useMemo(
    () => (target === undefined || board === null ? {} : boardShare(target, board, typed).taken),
    [target, board, typed],
  );
  const options = useMemo(
    () => ({ ...ofPattern, ...givenOptions({ ...ofBoard, ...typed }) }),
    [ofPattern, ofBoard, typed],
  );
  const rendered = useMemo(
    () => (table === null ? null : renderExport(table, targetId, options)),
    [table, targetId, options],
  );
  if (table === null || rendered === null) return <p role="status">No table has been built yet.</p>;
  if (chosen?.kind === 'waiting') return <p role="status">Reading the board…</p>;

  const problems = 'problems' in rendered ? rendered.problems : [];
  return (
    <div className="space-y-4">
      <SelectField
        label="Target"
        value={targetId}
        options={targets.map(({ id, title }) => ({ value: id, label: title }))}
        onChange={setTarget}
      />
      {chosen?.kind === 'failed' && (
        <>
          <ProblemNotice fault={chosen.problem} onTryAgain={chosen.tryAgain} />
          <p className="figure-note">These files are without the clock and the pins of the chosen board.</p>
        </>
      )}
      {target !== undefined && board !== null && (
        <BoardOptions {...{ board, target, typed, problems }} onSet={setOptions} />
      )}
      {target !== undefined && pattern !== undefined && (
        <PulsesNote {...{ target, pattern, typed }} onTake={setOptions} />
      )}
      {target !== undefined && (
        <OptionGroups
          target={target}
          typed={{ ...ofBoard, ...typed }}
          originOf={(name) =>
            board === null ? undefined : originFrom({ target, board, typed, onTake: setOptions }, name)
          }
          fallbacks={{ arrayName: arrayNameFrom(table.definition.name), pulses: ofPattern.pulses }}
          problemOf={(name) => {
            const problem = problems.find(({ path }) => path === `options.${name}`);
            return problem && `${problem.value} is not allowed. Allowed: ${problem.allowed}.`;
          }}
          onChange={(name, value) => {
            // Set to nothing is by hand too where a board would have it otherwise.
            const isBoards = board !== null && name in boardOptionsFor(target, board);
            setOptions({ [name]: value === '' && !isBoards ? undefined : value }, `export.${name}`);
          }}
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

/** The team's board that the output is shown for; null for the example, whose pins are made up. */
function useChosenBoard(): StageBoard | null {
  const { at } = useBoardAt();
  const shown = useStageBoard();
  return at === null ? null : shown;
}
