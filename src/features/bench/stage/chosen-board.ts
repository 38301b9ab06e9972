import { useCallback } from 'react';
import { useSearchParams } from 'react-router-dom';

const parameter = 'board';

/** A board of a team, by its address. */
export interface BoardAt {
  readonly team: string;
  readonly board: string;
}

/** Reads a board from the URL's `board`: `team/board`; what is none stands for the example. */
export function readBoardAt(text: string | null): BoardAt | null {
  const [, team, board] = /^([\w-]+)\/([\w-]+)$/.exec(text ?? '') ?? [];
  return team === undefined ? null : { team, board };
}

/** The board that the output is shown for, kept in the URL; null for the example. */
export function useBoardAt(): { at: BoardAt | null; choose: (at: BoardAt | null) => void } {
  const [parameters, setParameters] = useSearchParams();
  const at = readBoardAt(parameters.get(parameter));
  const choose = useCallback(
    (next: BoardAt | null) =>
      setParameters(
        (before) => {
          if (next === null) before.delete(parameter);
          else before.set(parameter, `${next.team}/${next.board}`);
          return before;
        },
        { replace: true, preventScrollReset: true },
      ),
    [setParameters],
  );
  return { at, choose };
}
